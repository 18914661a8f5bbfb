import sharp from 'sharp';
import { fromRaw, toRaw, type RawPicture } from '../../api/imaging/upright.ts';

/** sRGB transfer, IEC 61966-2-1, on a scale of 0 to 1. */
export const toLinear = (value: number) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4);
export const toSrgb = (light: number) => (light <= 0.0031308 ? 12.92 * light : 1.055 * light ** (1 / 2.4) - 0.055);

/** Numbers of 0 to 1 by chance, the same for the same seed. */
export function chance(seed: number): () => number {
  let state = seed;
  return () => (state = (state * 16807) % 2147483647) / 2147483647;
}

/** Light of a scene: linear red, green, blue, where 1 is what an exposure of 0 stops just holds. */
export interface Scene {
  light: Float32Array;
  width: number;
  height: number;
}

/** Light in steps fine enough that each of the 256 tones is met. */
const TONES = Uint8Array.from({ length: 65536 }, (_, step) => Math.round(255 * toSrgb(step / 65535)));

/** What a camera makes of a scene at so many stops, with a little noise (it also keeps measures of contrast from being exactly nothing). */
export function expose({ light, width, height }: Scene, ev: number, seed = 1, noise = 0.004): RawPicture {
  const random = chance(seed * 7919 + Math.round(ev * 100) + 1000);
  const data = Buffer.alloc(light.length);
  const gain = 2 ** ev;
  for (let at = 0; at < data.length; at++) {
    // Of even spread, which is as wide as that of the wanted deviation times the root of 12.
    const grain = (random() - 0.5) * 3.46 * noise;
    data[at] = TONES[Math.max(0, Math.min(65535, Math.round(65535 * ((light[at] ?? 0) * gain + grain))))] ?? 0;
  }
  return { data, width, height, channels: 3 };
}

const LIGHTS = Float32Array.from({ length: 256 }, (_, tone) => toLinear(tone / 255));
const scaled = new Map<string, Promise<RawPicture>>();

/** Part of a photograph as light: scaled to `long` and cut, so that cuts at other places are the same scene moved. */
export async function photographLight(
  file: string,
  long: number,
  cut: { left: number; top: number; width: number; height: number },
): Promise<Scene> {
  const key = `${file} ${long}`;
  const whole = scaled.get(key) ?? toRaw(sharp(file).resize(long).removeAlpha().toColourspace('srgb'));
  scaled.set(key, whole);
  const { data } = await toRaw(fromRaw(await whole).extract(cut));
  return { light: Float32Array.from(data, (tone) => LIGHTS[tone] ?? 0), width: cut.width, height: cut.height };
}

/** Photographs in Debian lomiri-wallpapers-16.04 (CC licences, see its copyright file) and mate-backgrounds (GPL-2+). */
export const BRIDGE = '/usr/share/backgrounds/Bridge_by_Sander_Klootwijk.jpg';
export const SUNSET = '/usr/share/backgrounds/sunset_by_Aitzol_Berasategi.jpg';
