import type { MouseEvent } from 'react';
import { Link } from 'react-router-dom';
import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { Picture } from '../../ui/picture.tsx';
import { alignedWords } from './bracket-words.ts';
import { CAPTION } from './grid-rows.ts';

interface Props {
  bracket: Bracket;
  lead: FrameItem | undefined;
  size: { width: number; height: number };
  /** Where it is shown large. */
  address: string;
  /** Chooses the frames of the bracket. */
  onPress: (event: MouseEvent) => void;
  onOpen: () => void;
}

/** What a client sees of a bracket, larger than its frames: the merged picture, or the lead frame where that is hung instead. */
export function BracketProof({ bracket, lead, size, address, onPress, onOpen }: Props) {
  const { merged, shows } = bracket;
  return (
    <div
      role="gridcell"
      className="block shrink-0 select-none"
      style={{ width: size.width }}
      onClick={onPress}
      onDoubleClick={onOpen}
      data-proof={bracket.id}
    >
      <div className="relative" style={size}>
        <Picture source={pictureOf(bracket, lead)} alt="" drawnWidth={size.width} className="size-full" />
        {shows === 'merged' && merged.state !== 'ready' ? <Instead bracket={bracket} /> : null}
      </div>
      <p className="flex items-center gap-2 text-13 text-mute" style={{ height: CAPTION }}>
        <Link
          to={address}
          className="min-w-0 flex-1 truncate font-bold text-ink hover:underline"
          onClick={(event) => event.stopPropagation()}
        >
          {shows === 'merged' ? 'Merged proof' : 'Lead frame as proof'}
        </Link>
        {shows === 'merged' && merged.state === 'ready' ? (
          <span className={`shrink-0 ${merged.leftOut.length > 0 ? 'font-bold text-copper' : ''}`}>{alignedWords(bracket)}</span>
        ) : null}
      </p>
    </div>
  );
}

function pictureOf({ merged, shows }: Bracket, lead: FrameItem | undefined) {
  if (shows === 'merged' && merged.state === 'ready') {
    const { width, height, placeholder, pictures } = merged;
    return { small: pictures?.['480'], medium: pictures?.['960'], width: width ?? 3, height: height ?? 2, thumbhash: placeholder };
  }
  // A failed bracket shows its lead frame, as its proof does.
  const shown = shows === 'lead' || merged.state === 'failed' ? lead?.pictures : null;
  return {
    small: shown?.['480'],
    medium: shown?.['960'],
    width: lead?.width || 3,
    height: lead?.height || 2,
    thumbhash: lead?.placeholder,
  };
}

function Instead({ bracket: { frameIds, merged } }: { bracket: Bracket }) {
  if (merged.state === 'waiting') {
    return (
      <p className="absolute inset-0 flex items-center justify-center p-3 text-center">
        <span className="bg-sheet px-2 py-1 text-13">{frameIds.length} exposures are being merged …</span>
      </p>
    );
  }
  return (
    <p className="absolute inset-x-0 bottom-0 border border-copper bg-sheet p-2 text-13 text-copper">
      <b>Not merged, the lead frame is shown.</b> {merged.problem}
    </p>
  );
}
