import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import opentype, { type Font, type Path } from 'opentype.js';

/** Words as one outline, in a box that begins at 0, 0. Units are thousandths of the letters' size. */
export interface Outline {
  /** The data of an SVG path. */
  path: string;
  width: number;
  height: number;
}

const SIZE = 1000;
/** Lato Black from the application's own package: Latin letters, and those with the marks of Central Europe. */
const FILES = ['lato-latin-900-normal.woff', 'lato-latin-ext-900-normal.woff'];
const packages = createRequire(import.meta.url);
let opened: Font[] | undefined;

function fonts(): Font[] {
  opened ??= FILES.map((name) => {
    const bytes = readFileSync(packages.resolve(`@fontsource/lato/files/${name}`));
    return opentype.parse(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength));
  });
  return opened;
}

function fontFor(letter: string): Font | undefined {
  return fonts().find((font) => font.charToGlyphIndex(letter) !== 0);
}

const lettersOf = (words: string) => [...words.normalize('NFC').replace(/\s+/g, ' ').trim()];

/** Letters that cannot be drawn, each once: the font has Latin letters only. */
export function missingLetters(words: string): string[] {
  return [...new Set(lettersOf(words).filter((letter) => !fontFor(letter)))];
}

/** Runs of letters that one font has, so that pairs are kerned within a run. */
function runsOf(words: string): { font: Font; letters: string }[] {
  const runs: { font: Font; letters: string }[] = [];
  for (const letter of lettersOf(words)) {
    const font = fontFor(letter);
    if (!font) continue;
    const last = runs.at(-1);
    if (last?.font === font) last.letters += letter;
    else runs.push({ font, letters: letter });
  }
  return runs;
}

/** Moves every point of an outline: corners and the control points of its curves. */
function move(outline: Path, dx: number, dy: number): void {
  for (const command of outline.commands) {
    const point = command as unknown as Record<string, number>;
    for (const axis of ['x', 'x1', 'x2']) if (point[axis] !== undefined) point[axis] += dx;
    for (const axis of ['y', 'y1', 'y2']) if (point[axis] !== undefined) point[axis] += dy;
  }
}

/**
 * Draws words as an outline, so that no font of the machine takes part and every machine draws the same.
 * @returns null where no letter of the words can be drawn.
 */
export function outlineOf(words: string): Outline | null {
  let x = 0;
  const whole = new opentype.Path();
  for (const { font, letters } of runsOf(words)) {
    whole.extend(font.getPath(letters, x, 0, SIZE));
    x += font.getAdvanceWidth(letters, SIZE);
  }
  const box = whole.getBoundingBox();
  const [width, height] = [box.x2 - box.x1, box.y2 - box.y1];
  if (!(width > 0 && height > 0)) return null;
  move(whole, -box.x1, -box.y1);
  return { path: whole.toPathData(1), width, height };
}
