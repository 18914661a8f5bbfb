import type { Compare, Likeness } from './likeness.ts';
import type { Exposure, Row } from './row.ts';
import { readMarks, type Marks } from './marks.ts';
import { differences, evenStep, ladder, unevenness } from './stops.ts';

/** Two exposures less than a third of a stop apart are the same; a telephone's free times are a little off the third. */
const SAME = 0.27;
const USUAL_COUNTS = [3, 5, 7, 9];

/** Cameras go from dark to bright, from bright to dark, or begin with the middle (makers' manuals). */
function inUsualOrder(asTaken: Row, sorted: Row): boolean {
  const places = asTaken.map((one) => sorted.indexOf(one));
  const steps = differences(places);
  const half = (sorted.length - 1) / 2;
  return steps.every((step) => step > 0) || steps.every((step) => step < 0) || Math.abs((places[0] as number) - half) < 1;
}

/** Seconds that passed between the exposures. */
function pauses(row: Row): number {
  return differences(row.map(({ moment }) => moment.begins)).reduce((sum, apart, index) => {
    const seconds = (apart - (row[index] as Exposure).lasts) / 1000;
    return sum + Math.min(2, Math.max(0, seconds));
  }, 0);
}

interface Looks {
  /** How many neighbours are seen to be two compositions. */
  different: number;
  doubtful: boolean;
  /** Some neighbours are seen to be one composition, brighter by about what the settings say. */
  confirmed: boolean;
  /** Pictures stay as bright as before although the settings say otherwise: the meter followed the light. */
  unchanged: boolean;
}

/** What a tone curve leaves of a stop, at least. */
const LEFT_OF_A_STOP = 0.3;

function look(sorted: readonly Exposure[], apart: readonly number[], compare: Compare): Looks {
  const seen = apart.map((step, index): Likeness & { share: number | null } => {
    const found = compare(sorted[index] as Exposure, sorted[index + 1] as Exposure);
    return { ...found, share: found.brighter === null ? null : found.brighter / step };
  });
  const share = (one: { share: number | null }) => one.share ?? 1;
  return {
    different: seen.filter(({ pictures }) => pictures === 'different').length,
    doubtful: seen.some(({ pictures }) => pictures === 'doubtful'),
    confirmed: seen.some((one) => one.pictures === 'alike' && one.share !== null && one.share >= LEFT_OF_A_STOP),
    unchanged: seen.some((one) => share(one) < LEFT_OF_A_STOP),
  };
}

/** Whether enough speaks for a bracket. What the camera marked is enough; without marks its pattern must be plain. */
function isMeant(marks: Marks, apart: readonly number[], looks: Looks): boolean {
  if (marks.marked) return true;
  if (looks.different > 0 || looks.doubtful || looks.unchanged) return false;
  const least = Math.min(...apart);
  if (apart.length === 1) return looks.confirmed && !marks.automatic && least > 0.6;
  const even = evenStep(apart) !== null;
  return marks.automatic ? even && least > (looks.confirmed ? 0.6 : 0.9) : looks.confirmed || even;
}

/**
 * What it is worth to take these exposures, in the order they were taken, for one bracket: more frames are worth more, up to a part of a point for
 * each thing that is unusual. 0 or less: they are none. 'never': nor is any longer part that holds them.
 */
export function worthAsBracket(row: Row, compare: Compare): number | 'never' {
  const sorted = [...row].sort((one, two) => (one.stops ?? NaN) - (two.stops ?? NaN));
  if (!differences(sorted.map((one) => one.stops ?? NaN)).every((step) => step >= SAME)) return 'never';
  const apart = differences(ladder(sorted.map(({ frame }) => frame)));
  const looks = look(sorted, apart, compare);
  const marks = readMarks(sorted, apart);
  if (!isMeant(marks, apart, looks)) return 0;
  const usual = USUAL_COUNTS.includes(row.length) ? 0.3 : 0;
  const order = inUsualOrder(row, sorted) ? 0 : 0.5;
  return row.length - 1 + usual - unevenness(apart) - order - 0.15 * pauses(row) - 2 * marks.against - looks.different;
}
