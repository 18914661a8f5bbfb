import path from 'node:path';
import type { FoundBracket } from '../../api/domain/brackets.ts';
import { mergeExposures, type MergedExposures } from '../../api/imaging/merge/merge-exposures.ts';
import { fromRaw } from '../../api/imaging/upright.ts';
import { developFile, type Examined } from './examine-file.ts';

const WHY = { moved: 'something moved in it', size: 'its size differs' };

function sayMerged(count: number, { leftOut }: MergedExposures, names: readonly string[]): string {
  const without = leftOut.map(({ index, why }) => `${names[index]} left out, as ${WHY[why]}`);
  return [`${count - leftOut.length} exposures merged`, ...without].join('; ');
}

/**
 * Merges the frames of a bracket, darkest first, and writes the picture into a folder that is there. `taken` are the names of the files written
 * before: two cards may hold the same name. @throws Refusal where a frame cannot be read any more, or an Error where nothing can be written
 */
export async function mergeBracket(found: FoundBracket, frames: readonly Examined[], folder: string, taken: Set<string>) {
  const exposures = [];
  for (const [index, frame] of frames.entries()) exposures.push({ picture: await developFile(frame), ev: found.steps[index] as number });
  const merged = await mergeExposures(exposures, found.frameIds.indexOf(found.leadId));
  const { name } = path.parse(found.leadId);
  let file = `${name}-merged.png`;
  for (let again = 2; taken.has(file); again++) file = `${name}-merged-${again}.png`;
  taken.add(file);
  await fromRaw(merged.picture).png().toFile(path.join(folder, file));
  const names = frames.map((frame) => path.basename(frame.file));
  return { file: path.join(folder, file), says: sayMerged(frames.length, merged, names) };
}
