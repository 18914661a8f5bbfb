import type { MouseEvent, ReactNode } from 'react';
import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { BracketProof } from './bracket-proof.tsx';
import { stepOf } from './bracket-words.ts';
import { FrameTile } from './frame-tile.tsx';
import { GAP, type FrameLine, type GridModel, type GridRow } from './grid-rows.ts';
import { SectionHeading } from './section-heading.tsx';
import type { Section } from './sections.ts';
import type { Selection } from './selection.ts';

/** What every tile of the grid is told. */
export interface TilesShared {
  model: GridModel;
  selection: Selection;
  /** The one frame that Tab comes to. */
  reachable: string | undefined;
  views: ReadonlyMap<string, { title: string; number: number }>;
  addressOf: (id: string, merged?: boolean) => string;
  onPress: (id: string, event: MouseEvent) => void;
  onMark: (id: string) => void;
  onOpen: (id: string, merged?: boolean) => void;
  onChooseAll: (frames: readonly FrameItem[], event: MouseEvent) => void;
  toolsOf: (section: Section) => ReactNode;
}

/** One row of the grid: a heading, a line of frames, or a bracket with its proof. */
export function GridRowView({ row, at, shared }: { row: GridRow; at: number; shared: TilesShared }) {
  if (row.kind === 'heading') {
    return (
      <div role="row" aria-rowindex={at + 1}>
        <SectionHeading section={row.section}>{shared.toolsOf(row.section)}</SectionHeading>
      </div>
    );
  }
  if (row.kind === 'frames') {
    return (
      <div role="row" aria-rowindex={at + 1} style={{ minHeight: row.height }}>
        <Line line={row.line} sentences={row.sentences} shared={shared} />
      </div>
    );
  }
  return (
    <div role="row" aria-rowindex={at + 1} style={{ height: row.height }}>
      <BracketLines row={row} shared={shared} />
    </div>
  );
}

function BracketLines({ row, shared }: { row: GridRow & { kind: 'bracket' }; shared: TilesShared }) {
  if (row.section.kind !== 'bracket') return null;
  const { bracket, frames } = row.section;
  return (
    <div className={row.layout.beside ? 'flex items-end' : 'flex flex-col'} style={{ gap: GAP }}>
      <BracketProof
        bracket={bracket}
        lead={frames.find((frame) => frame.id === bracket.leadFrameId)}
        size={row.layout.proof}
        address={shared.addressOf(bracket.leadFrameId, true)}
        onPress={(event) => shared.onChooseAll(frames, event)}
        onOpen={() => shared.onOpen(bracket.leadFrameId, true)}
      />
      <div className="flex flex-col" style={{ gap: GAP }}>
        {row.lines.map((line) => (
          <Line key={line.first} line={line} bracket={bracket} shared={shared} />
        ))}
      </div>
    </div>
  );
}

interface LineProps {
  line: FrameLine;
  bracket?: Bracket;
  sentences?: boolean;
  shared: TilesShared;
}

function Line({ line, bracket, sentences = false, shared }: LineProps) {
  const { model, selection, reachable, views } = shared;
  return (
    <div className="flex" style={{ gap: GAP }}>
      {model.frames.slice(line.first, line.first + line.widths.length).map((frame, place) => (
        <FrameTile
          key={frame.id}
          frame={frame}
          width={line.widths[place] ?? 0}
          height={line.height}
          chosen={selection.chosen.has(frame.id)}
          reachable={frame.id === reachable}
          view={frame.viewId === null ? undefined : views.get(frame.viewId)}
          step={bracket ? stepOf(bracket, frame.id) : undefined}
          leftOut={bracket?.merged.leftOut.some(({ frameId }) => frameId === frame.id) ?? false}
          sentences={sentences}
          address={shared.addressOf(frame.id)}
          onPress={shared.onPress}
          onMark={shared.onMark}
          onOpen={shared.onOpen}
        />
      ))}
    </div>
  );
}
