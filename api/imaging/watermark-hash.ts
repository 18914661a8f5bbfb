import { createHash } from 'node:crypto';
import type { WatermarkSettings } from '../domain/watermark-settings.ts';

/** Counts up whenever the same settings would draw something else. */
const WATERMARK_RECIPE = 1;

/** Names a watermark by everything that its look depends on; part of the keys of the pictures that carry it. */
export function watermarkHash(settings: WatermarkSettings): string {
  const { kind, text, imageKey, opacity, size, tiled } = settings;
  const look = kind === 'none' ? { kind } : { kind, what: kind === 'text' ? text : imageKey, opacity, size, tiled };
  return createHash('sha256')
    .update(JSON.stringify([WATERMARK_RECIPE, look]))
    .digest('hex')
    .slice(0, 16);
}
