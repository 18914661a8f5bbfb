import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { formatBias, formatFocalLength } from '../../../../api/domain/photo-notation.ts';
import { stem } from './frame-words.ts';
import { counted } from '../uploads/upload-words.ts';

const BRACKET = { one: 'bracket', many: 'brackets' };
const FRAME = { one: 'frame', many: 'frames' };

/** What stands above a bracket: "Bracket of 5", and "2 stops apart · f/11 · ISO 100 · 35 mm · 17:06:12". */
export function bracketHeading({ frameIds, says, takenLocal }: Bracket, lead: FrameItem | undefined): { title: string; settings: string } {
  // The number of frames is said first; here it is the title.
  const [, ...settings] = says.split(', ');
  const parts = [...settings, formatFocalLength(lead?.focalLength), takenLocal?.slice(11, 19)];
  return { title: `Bracket of ${frameIds.length}`, settings: parts.filter(Boolean).join(' · ') };
}

/** How many stops a frame is brighter than the lead: "−4", "0", "+1 1/3"; "?" where the camera did not say how it exposed. */
export function stepWords(step: number | null | undefined): string {
  if (step === null || step === undefined) return '?';
  const words = formatBias(step)?.replace(' EV', '') ?? `${step < 0 ? '−' : '+'}${Math.abs(Math.round(step))}`;
  return words === '±0' ? '0' : words;
}

/** The step of one frame of a bracket. */
export function stepOf(bracket: Bracket, frameId: string): string {
  return stepWords(bracket.steps[bracket.frameIds.indexOf(frameId)]);
}

/** "5 of 5 aligned" */
export function alignedWords({ frameIds, merged }: Bracket): string {
  return `${frameIds.length - merged.leftOut.length} of ${frameIds.length} aligned`;
}

/** Which frames of a bracket are not in its merged picture, and why: "HL_0412 was left out. It cannot be laid over …" */
export function leftOutWords({ merged }: Bracket, frames: readonly FrameItem[]): string[] {
  return merged.leftOut.map(({ frameId, says }) => {
    const frame = frames.find((one) => one.id === frameId);
    return `${frame ? stem(frame.name) : 'A frame'} was left out. ${says}`;
  });
}

function countPictures(frames: readonly FrameItem[]): { brackets: number; single: number } {
  const brackets = new Set(frames.flatMap((frame) => frame.bracketId ?? [])).size;
  return { brackets, single: frames.filter((frame) => frame.bracketId === null).length };
}

/** "1 bracket and 2 frames" */
export function picturesWords(frames: readonly FrameItem[]): string {
  const { brackets, single } = countPictures(frames);
  const words = [brackets > 0 ? counted(brackets, BRACKET) : '', single > 0 ? counted(single, FRAME) : ''];
  return words.filter(Boolean).join(' and ');
}

/** What goes onto a sheet: any frame of a bracket stands for the whole of it. "1 bracket as one proof and 2 frames". */
export function asProofsWords(frames: readonly FrameItem[]): string {
  const { brackets, single } = countPictures(frames);
  const words = [
    brackets > 0 ? `${counted(brackets, BRACKET)} as one proof${brackets > 1 ? ' each' : ''}` : '',
    single > 0 || brackets === 0 ? counted(single, FRAME) : '',
  ];
  return words.filter(Boolean).join(' and ');
}
