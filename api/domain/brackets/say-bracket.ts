import { formatAperture, formatIso, formatShutter } from '../photo-notation.ts';
import type { BracketCandidate, FoundBracket } from './candidate.ts';
import type { Exposure } from './row.ts';
import { differences, evenStep, inThirds, ladder } from './stops.ts';

const FRACTIONS: Record<number, string> = { 2: '1/3', 3: '1/2', 4: '2/3' };

/** "2", "1/3", "1 1/3". */
function sayNumber(stops: number): string {
  const sixths = Math.round(stops * 6);
  const [whole, rest] = [Math.floor(sixths / 6), FRACTIONS[sixths % 6]];
  return [whole > 0 || !rest ? String(whole) : '', rest ?? ''].filter(Boolean).join(' ');
}

function sayStops(stops: number): string {
  return `${sayNumber(stops)} ${stops > 1.01 ? 'stops' : 'stop'} apart`;
}

/** "2 stops apart"; where the steps differ, "1 to 2 stops apart". */
export function sayApart(apart: readonly number[]): string {
  const even = evenStep(apart);
  if (even !== null) return sayStops(inThirds(even));
  const [least, most] = [inThirds(Math.min(...apart)), inThirds(Math.max(...apart))];
  return least === most ? sayStops(most) : `${sayNumber(least)} to ${sayStops(most)}`;
}

type Settings = Pick<BracketCandidate, 'fNumber' | 'exposureTime' | 'iso'>;

/** A setting that all frames share, in words. */
function shared(frames: readonly Settings[], say: (frame: Settings) => string | null): string | null {
  const [first = null, ...others] = frames.map(say);
  return others.every((one) => one === first) ? first : null;
}

/** What a bracket is, in words; `apart` are the stops between neighbours as far as they are known. */
export function sayBracket(frames: readonly Settings[], apart: readonly number[]): string {
  const settings = [
    shared(frames, ({ fNumber }) => formatAperture(fNumber)),
    shared(frames, ({ exposureTime }) => formatShutter(exposureTime)),
    shared(frames, ({ iso }) => formatIso(iso)),
  ];
  return [`${frames.length} frames`, apart.some((stops) => stops > 0) ? sayApart(apart) : null, ...settings]
    .filter((part) => part !== null)
    .join(', ');
}

/** The exposure the camera measured: the one without bias where the camera wrote it, else the middle one, of two the earlier. */
function leadOf(byStops: readonly Exposure[], asTaken: readonly Exposure[]): Exposure {
  const biases = byStops.map(({ frame }) => frame.exposureBias).filter((bias) => bias !== null);
  const varies = biases.length > 1 && Math.max(...biases) - Math.min(...biases) > 0.2;
  const unbiased = byStops.find(({ frame }) => frame.exposureBias !== null && Math.abs(frame.exposureBias) < 0.05);
  if (varies && unbiased) return unbiased;
  const half = (byStops.length - 1) / 2;
  const middle = byStops.slice(Math.floor(half), Math.ceil(half) + 1);
  return asTaken.find((one) => middle.includes(one)) as Exposure;
}

/** Exposures, in the order they were taken, as the bracket they are. */
export function describeBracket(asTaken: readonly Exposure[]): FoundBracket {
  const byStops = [...asTaken].sort((one, two) => (one.stops as number) - (two.stops as number));
  const lead = leadOf(byStops, asTaken);
  const frames = byStops.map(({ frame }) => frame);
  const stops = ladder(frames);
  const metered = stops[byStops.indexOf(lead)] as number;
  return {
    frameIds: frames.map(({ id }) => id),
    leadId: lead.frame.id,
    steps: stops.map((value) => inThirds(value - metered)),
    says: sayBracket(frames, differences(stops)),
  };
}
