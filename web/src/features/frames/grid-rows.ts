import type { FrameItem } from '../../../../api/contract/frames.ts';
import { justify, type JustifiedRow, type Proportioned } from '../../ui/justify.ts';
import { layBracket, type BracketLayout } from './bracket-layout.ts';
import type { Section } from './sections.ts';

/** Room below each picture in CSS pixels: a line of words that is also a target of 24 px. */
export const CAPTION = 28;
export const GAP = 12;
const ROW_HEIGHT = 190;
const HEADING = 48;
/** In a narrow column the tools of a bracket stand below its words; each frame left out of the merge is a line more. */
const NARROW = 700;
const TOOLS = 36;
const NOTE = 20;
/** A sentence below a picture, as far as it can be known before it is drawn. */
const SENTENCE = 40;

/** Frames side by side, `first` counted in the order of all frames; `left` is where they begin. */
export interface FrameLine extends JustifiedRow {
  left: number;
  /** The row of the grid that they are drawn in. */
  row: number;
}

/** A row that is drawn, or not, as a whole. Heights in CSS pixels, before the row is drawn. */
export type GridRow = { key: string; height: number; section: Section } & (
  | { kind: 'heading' }
  | { kind: 'frames'; line: FrameLine; sentences: boolean }
  | { kind: 'bracket'; layout: BracketLayout; lines: FrameLine[] }
);

/** Everything a grid of frames shows, from top to bottom. */
export interface GridModel {
  frames: FrameItem[];
  /** The ids of the frames, in order. */
  order: string[];
  rows: GridRow[];
  /** The lines by which the arrow keys go up and down. */
  lines: FrameLine[];
}

/** Lays sections in a column of `width` CSS pixels. */
export function layGrid(sections: readonly Section[], width: number): GridModel {
  const frames = sections.flatMap((section) => section.frames);
  const model: GridModel = { frames, order: frames.map((frame) => frame.id), rows: [], lines: [] };
  if (width === 0) return model;
  let first = 0;
  for (const section of sections) {
    if (section.kind !== 'to-check' && !(section.kind === 'single' && !section.headed)) {
      model.rows.push({ kind: 'heading', key: `heading ${section.key}`, height: headingHeight(section, width), section });
    }
    if (section.kind === 'bracket') layBracketRow(model, section, first, width);
    else layFrameRows(model, section, first, width);
    first += section.frames.length;
  }
  return model;
}

function headingHeight(section: Section, width: number): number {
  if (section.kind !== 'bracket') return HEADING;
  return HEADING + (width < NARROW ? TOOLS : 0) + section.bracket.merged.leftOut.length * NOTE;
}

function layFrameRows(model: GridModel, section: Section, first: number, width: number): void {
  const sentences = section.kind === 'to-check';
  for (const row of justify(section.frames.map(shapeOf), { width, rowHeight: ROW_HEIGHT, gap: GAP })) {
    const line = { ...row, first: first + row.first, left: 0, row: model.rows.length };
    const height = row.height + CAPTION + GAP + (sentences ? SENTENCE : 0);
    model.lines.push(line);
    // The key of a frame's own row, so that rows keep their measured heights while others come and go.
    model.rows.push({ kind: 'frames', key: `${section.key} ${model.order[line.first]}`, height, section, line, sentences });
  }
}

function layBracketRow(model: GridModel, section: Section & { kind: 'bracket' }, first: number, width: number): void {
  const { merged, leadFrameId, shows } = section.bracket;
  const lead = section.frames.find((frame) => frame.id === leadFrameId) ?? section.frames[0];
  const proof = shows === 'merged' && merged.width && merged.height ? { width: merged.width, height: merged.height } : lead;
  const layout = layBracket(proof ? shapeOf(proof) : SHAPELESS, section.frames.map(shapeOf), { width, gap: GAP, caption: CAPTION });
  const left = layout.beside ? layout.proof.width + GAP : 0;
  const lines = layout.lines.map((line) => ({ ...line, first: first + line.first, left, row: model.rows.length }));
  model.lines.push(...lines);
  model.rows.push({ kind: 'bracket', key: section.key, height: bracketHeight(layout), section, layout, lines });
}

function bracketHeight({ proof, beside, lines }: BracketLayout): number {
  const ofProof = proof.height + CAPTION;
  const ofLines = lines.reduce((total, line) => total + line.height + CAPTION + GAP, -GAP);
  return (beside ? Math.max(ofProof, ofLines) : ofProof + GAP + ofLines) + GAP;
}

const SHAPELESS = { width: 3, height: 2 };

/** Without a size (a frame that could not be read) a tile takes the commonest proportion, not a square hole. */
function shapeOf(picture: Proportioned): Proportioned {
  return picture.width > 0 && picture.height > 0 ? picture : SHAPELESS;
}
