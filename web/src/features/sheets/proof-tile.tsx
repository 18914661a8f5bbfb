import { useState } from 'react';
import type { StudioProof } from '../../../../api/contract/sheets.ts';
import { Button } from '../../ui/button.tsx';
import { joinClasses } from '../../ui/join-classes.ts';
import { Picture } from '../../ui/picture.tsx';

interface Props {
  proof: StudioProof;
  view: string;
  editable: boolean;
  chosen: boolean;
  onChoose: () => void;
  /** Undefined at the beginning of its storey. */
  onEarlier: (() => void) | undefined;
  onLater: (() => void) | undefined;
  onDropBefore: (proofId: string) => void;
  /** Shows a bracket's merged picture or its lead frame; undefined where that cannot be changed. */
  onShow: ((shows: 'merged' | 'lead') => void) | undefined;
}

const HEIGHT = 148;
const DRAGGED = 'application/x-oriel-proof';

/** One proof on the studio's board. It is moved by its two buttons, or by dragging it onto another. */
export function ProofTile({ proof, view, editable, chosen, onChoose, onEarlier, onLater, onDropBefore, onShow }: Props) {
  const [over, setOver] = useState(false);
  const width = Math.round((HEIGHT * proof.width) / proof.height);
  const name = `Proof ${proof.number}, ${view}, ${proof.frameName}`;
  return (
    <li
      style={{ width: Math.max(width, 150) }}
      draggable={editable}
      onDragStart={(event) => event.dataTransfer.setData(DRAGGED, proof.id)}
      onDragOver={(event) => {
        if (!event.dataTransfer.types.includes(DRAGGED)) return;
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={(event) => {
        setOver(false);
        const id = event.dataTransfer.getData(DRAGGED);
        if (id && id !== proof.id) onDropBefore(id);
      }}
      className={joinClasses('list-none', over && 'shadow-[-4px_0_0_0_var(--color-ink)]')}
    >
      <button
        type="button"
        disabled={!editable}
        aria-pressed={editable ? chosen : undefined}
        aria-label={name}
        onClick={onChoose}
        className={joinClasses('relative block', chosen && 'outline-3 outline-ink')}
        style={{ width }}
      >
        <Picture source={{ ...proof, ...proof.pictures, thumbhash: proof.placeholder }} alt="" drawnWidth={width} />
        {proof.picked ? (
          <span className="absolute top-0 left-1/2 h-5 w-9 -translate-x-1/2 bg-copper [clip-path:polygon(0_0,100%_0,80%_100%,20%_100%)]" />
        ) : null}
      </button>
      <div className="flex items-start justify-between gap-1 pt-1 text-13">
        <p className="min-w-0 py-1">
          <b>{String(proof.number).padStart(2, '0')}</b> <span className="wrap-anywhere text-mute">{proof.frameName}</span>
          {proof.exposures ? <Exposures proof={proof} onShow={onShow} /> : null}
          {proof.ready ? null : <span className="block text-mute">watermark being laid</span>}
          {proof.markedBy.length > 0 ? (
            <span className="block text-mute">
              {proof.picked ? <b className="text-copper">Picked</b> : 'Marked'} by {proof.markedBy.join(', ')}
            </span>
          ) : null}
        </p>
        {editable ? (
          <span className="flex shrink-0">
            <Mover words={`Move ${name} earlier`} sign="←" onMove={onEarlier} />
            <Mover words={`Move ${name} later`} sign="→" onMove={onLater} />
          </span>
        ) : null}
      </div>
    </li>
  );
}

/** What a bracket's proof is made of, and the way to show its other picture. */
function Exposures({ proof, onShow }: Pick<Props, 'proof' | 'onShow'>) {
  const merged = proof.exposures?.merged;
  return (
    <span className="block">
      {proof.exposures?.says}
      {onShow ? (
        <button
          type="button"
          className="target block text-left underline underline-offset-4 hover:no-underline"
          onClick={() => onShow(merged ? 'lead' : 'merged')}
        >
          {merged ? 'Show the lead frame' : 'Show it merged'}
          <span className="sr-only"> as proof {proof.number}</span>
        </button>
      ) : null}
    </span>
  );
}

function Mover({ words, sign, onMove }: { words: string; sign: string; onMove: (() => void) | undefined }) {
  return (
    <Button size="small" className="-ml-px border-line px-2" aria-label={words} disabled={!onMove} onClick={onMove}>
      <span aria-hidden="true">{sign}</span>
    </Button>
  );
}
