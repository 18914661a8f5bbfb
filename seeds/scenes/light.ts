import type { Colour } from './vector.ts';

/**
 * The light of an hour. Strengths are shares of full sunlight: 1 stands for about 100,000 lux, so a street lamp's
 * 20 lux are 0.0002, and a lit room of 150 cd/m2 has a radiance of about 0.0015.
 */
export interface Light {
  /** Degrees; azimuth 0 is behind the subject (+z), 90 to the right, 180 behind the camera. */
  sunAzimuth: number;
  sunElevation: number;
  /** Dust and water in the air, 1 for a clear day. */
  haze: number;
  /** Share of the sky under cumulus, and how much high thin cloud. */
  clouds: number;
  veil: number;
  /** 0 clear, 1 a closed grey sky without a sun. */
  overcast: number;
  /** Distance in metres over which a view loses 63 % of its contrast. */
  visibility: number;
  /** Share of the usual rooms that are lit, and strength of their light. */
  rooms: number;
  /** 1 when the street lamps burn. */
  lamps: number;
  /** What the meter aims for: middle grey is 0.18. */
  key: number;
  /** Exposure value at ISO 100 a hand-held meter would show. */
  exposureValue: number;
  /** White balance: factors on red, green and blue. */
  balance: Colour;
  wind: number;
}

const day: Light = {
  sunAzimuth: 215,
  sunElevation: 38,
  haze: 1.6,
  clouds: 0.42,
  veil: 0.35,
  overcast: 0,
  visibility: 9000,
  rooms: 0.15,
  lamps: 0,
  key: 0.19,
  exposureValue: 14.3,
  balance: [1.04, 1, 0.95],
  wind: 1,
};

/** The hours the demo was photographed in. */
export const lights = {
  day,
  dawn: { ...day, sunAzimuth: 318, sunElevation: 1.6, haze: 2.2, clouds: 0.36, veil: 0.75, visibility: 2600, rooms: 0.3, lamps: 0.6, key: 0.15, exposureValue: 9, balance: [0.96, 1, 1.12], wind: 0.35 }, // prettier-ignore
  morning: { ...day, sunAzimuth: 128, sunElevation: 17, haze: 2.4, clouds: 0.3, veil: 0.5, visibility: 3600, key: 0.17, exposureValue: 13, balance: [1, 1, 0.98] }, // prettier-ignore
  gold: { ...day, sunAzimuth: 242, sunElevation: 9, haze: 2.2, clouds: 0.38, veil: 0.6, visibility: 4200, rooms: 0.2, key: 0.185, exposureValue: 12.3, balance: [1.01, 0.99, 1.03] }, // prettier-ignore
  overcast: { ...day, sunElevation: 40, clouds: 0.95, overcast: 1, visibility: 3400, rooms: 0.35, key: 0.26, exposureValue: 12, balance: [1.02, 1, 0.98] }, // prettier-ignore
  fog: { ...day, sunAzimuth: 20, sunElevation: 25, overcast: 1, clouds: 0, visibility: 190, rooms: 0.6, lamps: 1, key: 0.36, exposureValue: 10.6, balance: [1.02, 1, 1], wind: 0.2 }, // prettier-ignore
  dusk: { ...day, sunAzimuth: 22, sunElevation: -1.8, haze: 2, clouds: 0.42, veil: 0.8, visibility: 3000, rooms: 0.85, lamps: 1, key: 0.12, exposureValue: 6.3, balance: [1, 1.02, 0.94], wind: 0.5 }, // prettier-ignore
  blue: { ...day, sunAzimuth: 330, sunElevation: -4.6, haze: 1.5, clouds: 0.3, veil: 0.4, visibility: 3200, rooms: 0.75, lamps: 1, key: 0.085, exposureValue: 3.3, balance: [1.06, 1, 0.86], wind: 0.4 }, // prettier-ignore
  night: { ...day, sunAzimuth: 30, sunElevation: -9, haze: 1.5, clouds: 0.35, veil: 0.4, visibility: 2600, rooms: 0.7, lamps: 1, key: 0.05, exposureValue: 1, balance: [0.86, 1, 1.22], wind: 0.4 }, // prettier-ignore
} satisfies Record<string, Light>;

export type LightName = keyof typeof lights;
