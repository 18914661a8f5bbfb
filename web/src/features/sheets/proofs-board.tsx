import { useMemo, useState } from 'react';
import type { StudioProof, StudioSheet } from '../../../../api/contract/sheets.ts';
import { Button } from '../../ui/button.tsx';
import { Select } from '../../ui/select.tsx';
import { Storey } from '../../ui/storey.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { useSheetDeed } from './mutations.ts';
import { ProofTile } from './proof-tile.tsx';
import { counted } from './sheet-words.ts';

interface StoreyOfProofs {
  viewId: string | null;
  title: string;
  number: number | null;
  proofs: StudioProof[];
}

type Views = ReadonlyMap<string, { title: string; number: number }>;

function readStoreys(sheet: StudioSheet, views: Views): StoreyOfProofs[] {
  const storeys = [...views].map(([viewId, { title, number }]) => ({
    viewId,
    title,
    number,
    proofs: sheet.proofs.filter((proof) => proof.viewId === viewId),
  }));
  const also = {
    viewId: null,
    title: 'Also made',
    number: null,
    proofs: sheet.proofs.filter((proof) => !proof.viewId || !views.has(proof.viewId)),
  };
  return [...storeys, also].filter((storey) => storey.proofs.length > 0);
}

/** Puts `id` in the place of `before`, or last where that is null. */
export function moveBefore(ids: readonly string[], id: string, before: string | null): string[] {
  const others = ids.filter((each) => each !== id);
  const at = before === null ? others.length : others.indexOf(before);
  return [...others.slice(0, at), id, ...others.slice(at)];
}

/** The proofs of a sheet, storey by storey: put in order, hung under views, taken off. */
export function ProofsBoard({ sheet, views }: { sheet: StudioSheet; views: Views }) {
  const deed = useSheetDeed(sheet);
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const storeys = useMemo(() => readStoreys(sheet, views), [sheet, views]);
  const ids = storeys.flatMap((storey) => storey.proofs.map((proof) => proof.id));
  const present = ids.filter((id) => chosen.has(id));
  const toggle = (id: string) =>
    setChosen((before) => new Set(before.has(id) ? [...before].filter((each) => each !== id) : [...before, id]));
  const move = (id: string, before: string | null) => deed.mutate({ what: 'order', proofIds: moveBefore(ids, id, before) });

  return (
    <section aria-label={`Proofs of sheet ${sheet.number}`}>
      {sheet.can.edit ? <BoardBar sheet={sheet} views={views} chosen={present} deed={deed} onClear={() => setChosen(new Set())} /> : null}
      {deed.error ? (
        <p role="alert" className="mb-3 border border-copper bg-sheet px-4 py-2 font-bold text-copper">
          {deed.error.message}
        </p>
      ) : null}
      {storeys.map((storey) => (
        <Storey
          key={storey.viewId ?? 'also'}
          gutter="narrow"
          headingLevel="h2"
          lettering={`${storey.number === null ? '' : `View ${storey.number} · `}${counted(storey.proofs.length, 'proof')}`}
          title={storey.title}
        >
          <ul className="flex flex-wrap gap-3 pt-3.5 pb-6">
            {storey.proofs.map((proof, at) => (
              <ProofTile
                key={proof.id}
                proof={proof}
                view={storey.title}
                editable={sheet.can.edit}
                chosen={chosen.has(proof.id)}
                onChoose={() => toggle(proof.id)}
                onEarlier={at > 0 ? () => move(proof.id, storey.proofs[at - 1]?.id ?? null) : undefined}
                onLater={
                  at < storey.proofs.length - 1 ? () => move(proof.id, storey.proofs[at + 2]?.id ?? nextStorey(storeys, storey)) : undefined
                }
                onShow={showerOf(proof, (bracketId, shows) => deed.mutate({ what: 'show-bracket', bracketId, shows }), sheet.can.edit)}
                onDropBefore={(id) => {
                  if (storey.proofs.some((each) => each.id === id)) move(id, proof.id);
                }}
              />
            ))}
          </ul>
        </Storey>
      ))}
    </section>
  );
}

/** Changes what a bracket's proof shows; undefined for a single frame, and where the sheet cannot be changed. */
function showerOf({ bracketId }: StudioProof, show: (bracketId: string, shows: 'merged' | 'lead') => void, editable: boolean) {
  return bracketId !== null && editable ? (shows: 'merged' | 'lead') => show(bracketId, shows) : undefined;
}

/** The proof behind the last one of a storey, which the last one must come before. */
function nextStorey(storeys: readonly StoreyOfProofs[], storey: StoreyOfProofs): string | null {
  return storeys[storeys.indexOf(storey) + 1]?.proofs[0]?.id ?? null;
}

interface BarProps {
  sheet: StudioSheet;
  views: Views;
  chosen: string[];
  deed: ReturnType<typeof useSheetDeed>;
  onClear: () => void;
}

/** What can be done with the proofs that are chosen. */
function BoardBar({ sheet, views, chosen, deed, onClear }: BarProps) {
  const choices = [
    { value: '', words: 'Hang under …' },
    ...[...views].map(([value, { title, number }]) => ({ value, words: `View ${number}: ${title}` })),
    { value: 'none', words: 'Also made' },
  ];
  const takeOff = () => {
    const frameIds = sheet.proofs.filter((proof) => chosen.includes(proof.id)).map((proof) => proof.frameId);
    deed.mutate(
      { what: 'take-off', proofIds: chosen },
      {
        onSuccess: () => {
          onClear();
          showNotice(`Took ${counted(chosen.length, 'proof')} off the sheet. The frames are still there.`, {
            undo: () => deed.mutate({ what: 'put', frameIds }),
          });
        },
      },
    );
  };
  return (
    <div className="sticky top-0 z-10 flex min-h-12 flex-wrap items-center gap-2 bg-paper py-2">
      <p className="mr-2 text-mute" aria-live="polite">
        {chosen.length === 0 ? 'Choose proofs to hang them elsewhere or take them off.' : `${counted(chosen.length, 'proof')} chosen`}
      </p>
      {chosen.length > 0 ? (
        <>
          <Select
            scale="small"
            aria-label="Hang the chosen proofs under a view"
            choices={choices}
            value=""
            className="max-w-64"
            onChange={({ target }) =>
              deed.mutate({ what: 'hang', proofIds: chosen, viewId: target.value === 'none' ? null : target.value }, { onSuccess: onClear })
            }
          />
          <Button size="small" busy={deed.isPending} onClick={takeOff}>
            Take off
          </Button>
          <Button size="small" tone="quiet" onClick={onClear}>
            Choose none
          </Button>
        </>
      ) : null}
    </div>
  );
}
