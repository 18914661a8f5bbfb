import { parseArgs } from 'node:util';

export const HELP = `npm run look -- FILES… [--json] [--merge DIR]

Says what is found in files on this disk: the settings, the exposure value, brackets and why they are
brackets, what to check, and what each picture is good for. Folders are read for their pictures.
Nothing is uploaded and nothing is changed.

  --json        one JSON document instead of words (npm run --silent look -- …)
  --merge DIR   writes each bracket's merged picture into DIR as PNG
  --help        this text

Ends with 1 where a file could not be read; the others are answered all the same.`;

export interface Wishes {
  paths: string[];
  json: boolean;
  /** Folder for merged pictures. */
  merge: string | null;
  help: boolean;
}

/** Reads the command line. @throws Error with a sentence about an option that is not known or lacks its folder */
export function readWishes(words: string[]): Wishes {
  const { values, positionals } = parseArgs({
    args: words,
    allowPositionals: true,
    options: { json: { type: 'boolean' }, merge: { type: 'string' }, help: { type: 'boolean', short: 'h' } },
  });
  return { paths: positionals, json: values.json ?? false, merge: values.merge ?? null, help: values.help ?? false };
}
