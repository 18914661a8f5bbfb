import fs from 'node:fs/promises';
import os from 'node:os';
import { groupBrackets, type FoundBracket } from '../../api/domain/brackets.ts';
import { Refusal } from '../../api/imaging/refusal.ts';
import { alikeChecks } from './alike-checks.ts';
import { candidateOf, examineFile, type Examined } from './examine-file.ts';
import type { BracketFinding, Findings, Problem } from './findings.ts';
import { mergeBracket } from './merge-bracket.ts';
import { gatherFiles } from './picture-files.ts';
import { presentFile } from './present-file.ts';

/** What cannot be read is a sentence, whatever it is: one bad file never costs the others their answer. */
function problemOf(file: string, error: unknown): Problem {
  if (error instanceof Refusal) return { file, says: error.message };
  return { file, says: `It cannot be read (${error instanceof Error ? error.message : String(error)}).` };
}

/** Examines files on all cores: decoding runs beside the measuring of another. */
async function examineAll(files: readonly string[], problems: Problem[]): Promise<Examined[]> {
  const examined: (Examined | null)[] = files.map(() => null);
  const waiting = [...files.entries()];
  const lane = async () => {
    for (let next = waiting.shift(); next; next = waiting.shift()) {
      const [index, file] = next;
      examined[index] = await examineFile(file).catch((error: unknown) => {
        problems.push(problemOf(file, error));
        return null;
      });
    }
  };
  await Promise.all(Array.from({ length: os.availableParallelism() }, lane));
  return examined.filter((one) => one !== null);
}

async function mergeAll(found: readonly FoundBracket[], examined: readonly Examined[], folder: string, problems: Problem[]) {
  const byFile = new Map(examined.map((one) => [one.file, one]));
  const [written, taken] = [new Map<FoundBracket, BracketFinding['merged']>(), new Set<string>()];
  for (const bracket of found) {
    const frames = bracket.frameIds.map((id) => byFile.get(id) as Examined);
    try {
      written.set(bracket, await mergeBracket(bracket, frames, folder, taken));
    } catch (error) {
      problems.push(problemOf(bracket.leadId, error));
    }
  }
  return written;
}

async function openFolder(folder: string | null, problems: Problem[]): Promise<string | null> {
  if (folder === null) return null;
  try {
    await fs.mkdir(folder, { recursive: true });
    return folder;
  } catch {
    problems.push({ file: folder, says: 'This folder cannot be made, so nothing is merged.' });
    return null;
  }
}

/** Looks at files and folders; merged pictures are written where a folder for them is named. */
export async function lookAt(names: readonly string[], mergeInto: string | null): Promise<Findings> {
  const { files, problems } = await gatherFiles(names);
  if (names.length === 0) problems.push({ file: '', says: 'Name the files or folders to look at; --help says more.' });
  const examined = await examineAll(files, problems);
  const found = groupBrackets(examined.map(candidateOf));
  const folder = await openFolder(mergeInto, problems);
  const merged = folder === null ? null : await mergeAll(found, examined, folder, problems);
  const bracketed = new Set(found.flatMap(({ frameIds }) => frameIds));
  const brackets = found.map((one): BracketFinding => {
    const picture = merged?.get(one);
    return { files: one.frameIds, lead: one.leadId, says: one.says, ...(picture && { merged: picture }) };
  });
  const alike = alikeChecks(examined, found);
  const answered = examined.map((one) => presentFile(one, bracketed.has(one.file), alike.get(one.file)));
  return { files: answered, brackets, ...(problems.length > 0 && { problems }) };
}
