import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Picture } from '../../ui/picture.tsx';
import type { BracketActions } from './bracket-actions.ts';
import { bracketHeading, stepOf } from './bracket-words.ts';
import { captionSettings } from './frame-words.ts';

interface Props {
  bracket: Bracket;
  frames: readonly FrameItem[];
  actions: BracketActions;
  onClose: () => void;
}

/** The frames of a bracket one by one: which of them leads, and which does not belong to it. */
export function BracketDialog({ bracket, frames, actions, onClose }: Props) {
  const { title } = bracketHeading(bracket, undefined);
  const takeOut = (frame: FrameItem) => {
    void actions.takeOut(bracket, [frame.id]);
    onClose();
  };
  return (
    <Dialog open wide title={`${title}: its frames`} onClose={onClose}>
      <p className="mb-2 text-mute">
        The others are laid over the lead frame, and it is the proof where the merged picture is not shown. What you decide here stays:
        frames are not regrouped afterwards.
      </p>
      {bracket.can.why ? <p className="mb-2 font-bold">{bracket.can.why}</p> : null}
      <ul className="divide-y divide-hair">
        {frames.map((frame) => (
          <FrameRow
            key={frame.id}
            frame={frame}
            step={stepOf(bracket, frame.id)}
            bracket={bracket}
            onLead={() => void actions.change(bracket, { leadFrameId: frame.id })}
            onTakeOut={() => takeOut(frame)}
          />
        ))}
      </ul>
    </Dialog>
  );
}

interface RowProps {
  frame: FrameItem;
  step: string;
  bracket: Bracket;
  onLead: () => void;
  onTakeOut: () => void;
}

function FrameRow({ frame, step, bracket, onLead, onTakeOut }: RowProps) {
  const isLead = frame.id === bracket.leadFrameId;
  const source = { small: frame.pictures?.['480'], width: frame.width || 3, height: frame.height || 2, thumbhash: frame.placeholder };
  return (
    <li className="flex list-none flex-wrap items-center gap-3 py-2">
      <span className="w-24">
        <span className="mx-auto block" style={{ width: Math.min(96, (64 * source.width) / source.height) }}>
          <Picture source={source} alt="" drawnWidth={96} />
        </span>
      </span>
      <p className="min-w-40 flex-1">
        <b className="break-all">{frame.name}</b>
        <span className="block text-13 text-mute">
          {step} · {captionSettings(frame)}
        </span>
      </p>
      {isLead ? (
        <b className="px-3 text-13 text-verdigris">Lead frame</b>
      ) : (
        <Button size="small" disabled={!bracket.can.change} onClick={onLead}>
          Make it the lead <span className="sr-only">({frame.name})</span>
        </Button>
      )}
      <Button size="small" disabled={!bracket.can.regroup} onClick={onTakeOut}>
        Take out <span className="sr-only">({frame.name})</span>
      </Button>
    </li>
  );
}
