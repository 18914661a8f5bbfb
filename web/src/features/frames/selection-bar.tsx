import { FEWEST_EXPOSURES, MOST_EXPOSURES, type Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { Button } from '../../ui/button.tsx';
import { counted } from '../uploads/upload-words.ts';
import type { FrameActions } from './actions.ts';
import type { BracketActions } from './bracket-actions.ts';
import { asProofsWords } from './bracket-words.ts';
import { HangMenu, SheetMenu } from './frame-menus.tsx';

interface Props {
  commissionId: string;
  /** The chosen frames, in the order in which they are shown. */
  frames: readonly FrameItem[];
  views: ReadonlyMap<string, { title: string; number: number }>;
  actions: FrameActions;
  brackets: ReadonlyMap<string, Bracket>;
  bracketActions: BracketActions;
  /** They were deleted: they can be brought back and nothing else. */
  deleted: boolean;
  onDelete: () => void;
  onNone: () => void;
}

/** Over the lower edge while frames are chosen: how many, and what can be done with them. */
export function SelectionBar(props: Props) {
  const { commissionId, frames, views, actions, deleted, onDelete, onNone } = props;
  const ids = frames.map((frame) => frame.id);
  const ready = frames.filter((frame) => frame.state === 'ready').map((frame) => frame.id);
  const someHidden = frames.some((frame) => frame.hidden);
  const someVisible = frames.some((frame) => !frame.hidden);
  return (
    <div
      data-foot
      className="sticky bottom-0 z-20 -mx-1 mt-3 flex flex-wrap items-center gap-x-2 gap-y-1.5 border border-ink bg-sheet px-3 py-2"
    >
      <p role="status" className="font-bold">
        {counted(frames.length, { one: 'chosen', many: 'chosen' })}
      </p>
      {frames.some((frame) => frame.bracketId !== null) ? <p className="text-13 text-mute">{asProofsWords(frames)}</p> : null}
      <Button size="small" tone="quiet" className="mr-auto" onClick={onNone}>
        None
      </Button>
      {deleted ? (
        <Button size="small" onClick={() => void actions.restore(frames)}>
          Bring back
        </Button>
      ) : (
        <>
          {ready.length > 0 ? <SheetMenu ids={ready} actions={actions} commissionId={commissionId} /> : null}
          <Regrouping {...props} />
          <HangMenu ids={ids} actions={actions} views={views} />
          {someVisible ? (
            <Button size="small" onClick={() => void actions.hide(ids, true)}>
              Hide
            </Button>
          ) : null}
          {someHidden ? (
            <Button size="small" onClick={() => void actions.hide(ids, false)}>
              Show again
            </Button>
          ) : null}
          <Button size="small" tone="danger" onClick={onDelete}>
            Delete
          </Button>
        </>
      )}
    </div>
  );
}

/** Joins the chosen frames to one bracket, or takes them out of theirs. */
function Regrouping({ frames, brackets, bracketActions }: Props) {
  const [first] = frames;
  const together = first?.bracketId && frames.every((frame) => frame.bracketId === first.bracketId);
  const bracket = together ? brackets.get(first.bracketId ?? '') : undefined;
  const some = bracket !== undefined && frames.length < bracket.frameIds.length;
  const enough = frames.length >= FEWEST_EXPOSURES && frames.length <= MOST_EXPOSURES;
  const joinable = enough && !together && frames.every((frame) => frame.state === 'ready' && !frame.hidden);
  return (
    <>
      {joinable ? (
        <Button size="small" onClick={() => void bracketActions.join(frames)}>
          Join
        </Button>
      ) : null}
      {bracket && some && bracket.can.regroup ? (
        <Button
          size="small"
          onClick={() =>
            void bracketActions.takeOut(
              bracket,
              frames.map((frame) => frame.id),
            )
          }
        >
          Take out
        </Button>
      ) : null}
      {bracket && frames.length === 1 && first && first.id !== bracket.leadFrameId && bracket.can.change ? (
        <Button size="small" onClick={() => void bracketActions.change(bracket, { leadFrameId: first.id })}>
          Make it the lead
        </Button>
      ) : null}
    </>
  );
}
