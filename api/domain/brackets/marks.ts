import type { Exposure } from './row.ts';

/** What the camera itself wrote about its frames being a bracket. */
export interface Marks {
  /** It says so: all frames are of an automatic bracket, or their biases differ as their exposures do. */
  marked: boolean;
  /** It says that each frame was exposed automatically, and nothing of a bias: differences come from the meter. */
  automatic: boolean;
  /** How many of its marks speak against this being one bracket. */
  against: number;
}

/** ExposureMode of an automatic bracket (CIPA DC-008, tag 0xA402). */
const AUTO_BRACKET = 2;
/** Bias is written in tenths at times ("0.7", "0.65" for two thirds), and the meter may move by a third between frames. */
const BIAS_TOLERANCE = 0.4;
const SAME_BIAS = 0.2;

function readModes(frames: readonly Exposure[]): { bracket: boolean; mixed: boolean; automatic: boolean } {
  const modes = frames.map(({ frame }) => frame.exposureMode).filter((mode) => mode !== null);
  const bracket = modes.length > 0 && modes.every((mode) => mode === AUTO_BRACKET);
  return {
    bracket,
    mixed: !bracket && modes.includes(AUTO_BRACKET),
    automatic: modes.length === frames.length && modes.every((mode) => mode === 0),
  };
}

/** Biases of neighbours in exposure: do they differ as the exposures do? Unknown ones say nothing. */
function readBiases(sorted: readonly Exposure[], apart: readonly number[]): { agree: boolean; differ: boolean } {
  const biases = sorted.map(({ frame }) => frame.exposureBias);
  const known = biases.filter((bias) => bias !== null);
  const flat = known.length > 1 && Math.max(...known) - Math.min(...known) <= SAME_BIAS;
  if (known.length < 2 || flat) return { agree: false, differ: false };
  const pairs = apart.flatMap((step, index) => {
    const [darker = null, brighter = null] = biases.slice(index, index + 2);
    return darker === null || brighter === null ? [] : [{ step, bias: brighter - darker }];
  });
  const agree = pairs.every(({ step, bias }) => bias > SAME_BIAS && Math.abs(bias - step) <= BIAS_TOLERANCE);
  return { agree: agree && pairs.length > 0, differ: !agree };
}

/** Reads ExposureMode and exposure bias of frames sorted by brightness, `apart` being the stops between them. */
export function readMarks(sorted: readonly Exposure[], apart: readonly number[]): Marks {
  const modes = readModes(sorted);
  const biases = readBiases(sorted, apart);
  return {
    marked: !modes.mixed && (modes.bracket || biases.agree),
    automatic: modes.automatic && !biases.agree,
    against: Number(modes.mixed) + Number(biases.differ),
  };
}
