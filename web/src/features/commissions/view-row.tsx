import type { View } from '../../../../api/contract/commissions.ts';
import { Button } from '../../ui/button.tsx';

interface Props {
  view: View;
  number: number;
  last: boolean;
  editable: boolean;
  /** -1 up, 1 down. */
  onMove: (by: -1 | 1) => void;
  onChange: () => void;
  onDelete: () => void;
  onDragStart: () => void;
  onDrop: () => void;
}

function hung({ frames, proofs }: View): string {
  const parts = [
    frames > 0 && `${frames} ${frames === 1 ? 'frame' : 'frames'}`,
    proofs > 0 && `${proofs} ${proofs === 1 ? 'proof' : 'proofs'}`,
  ];
  return parts.filter(Boolean).join(', ') || 'nothing hung yet';
}

/** One view of the brief with the buttons that move, change and delete it. */
export function ViewRow({ view, number, last, editable, onMove, onChange, onDelete, onDragStart, onDrop }: Props) {
  return (
    <li
      className="grid grid-cols-[28px_minmax(0,1fr)_auto] items-start gap-3 border-t border-line px-3.5 py-3 first:border-t-0"
      draggable={editable}
      onDragStart={onDragStart}
      onDragOver={(event) => event.preventDefault()}
      onDrop={(event) => {
        event.preventDefault();
        onDrop();
      }}
    >
      <span className="font-bold">{number}</span>
      <span className="min-w-0">
        <b className="block wrap-break-word">{view.title}</b>
        {view.askedFor ? <span className="block wrap-break-word whitespace-pre-wrap">{view.askedFor}</span> : null}
        <span className="block text-13 text-mute">{hung(view)}</span>
      </span>
      {editable ? (
        <span className="flex flex-wrap justify-end gap-1">
          <Button size="small" aria-label={`Move “${view.title}” up`} disabled={number === 1} onClick={() => onMove(-1)}>
            ↑
          </Button>
          <Button size="small" aria-label={`Move “${view.title}” down`} disabled={last} onClick={() => onMove(1)}>
            ↓
          </Button>
          <Button size="small" aria-label={`Change “${view.title}”`} onClick={onChange}>
            Change
          </Button>
          <Button size="small" tone="danger" aria-label={`Delete “${view.title}”`} onClick={onDelete}>
            Delete
          </Button>
        </span>
      ) : null}
    </li>
  );
}
