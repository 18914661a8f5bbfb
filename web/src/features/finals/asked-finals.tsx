import { useState } from 'react';
import type { FinalItem, FinalList, PickForFinal } from '../../../../api/contract/finals.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { Select } from '../../ui/select.tsx';
import { doubtWords, pickWords, sheetCount, sizeWords } from './final-words.ts';
import { useFinalDeed } from './mutations.ts';
import { Thumb } from './thumb.tsx';

/** Finals whose pick nobody may guess: each with the picks that come into consideration. */
export function AskedFinals({ commissionId, list }: { commissionId: string; list: FinalList }) {
  const asked = list.finals.filter((final) => final.match === 'ask');
  if (asked.length === 0) return null;
  return (
    <section aria-labelledby="asked" className="grid gap-3">
      <h2 id="asked" className="text-17">
        Which pick is this? <span className="font-normal text-mute">· {asked.length} to answer</span>
      </h2>
      <ul className="grid gap-3">
        {asked.map((final) => (
          <AskedFinal key={final.id} commissionId={commissionId} final={final} list={list} />
        ))}
      </ul>
    </section>
  );
}

function AskedFinal({ commissionId, final, list }: { commissionId: string; final: FinalItem; list: FinalList }) {
  const deeds = useFinalDeed(commissionId);
  const [newest] = final.versions;
  if (!newest) return null;
  const sheets = sheetCount(list.picks);
  const likely = final.candidates.flatMap((id) => list.picks.find((pick) => pick.frameId === id) ?? []).slice(0, 4);
  const answer = (frameId: string | null) => deeds.mutate({ what: 'change', final, input: { frameId } });
  const busy = deeds.isPending || !list.can.change;
  return (
    <li className="grid list-none gap-4 border border-copper bg-sheet p-4 lg:grid-cols-[minmax(0,320px)_1fr]">
      <div className="flex gap-3">
        <Thumb {...newest} picture={newest.pictures?.['480']} box={{ width: 150, height: 110 }} />
        <div className="min-w-0">
          <p className="font-bold wrap-anywhere">{newest.originalName}</p>
          <p className="text-13 text-mute">{sizeWords(newest)}</p>
          <p className="mt-1 text-13 text-copper">{doubtWords(final.doubt ?? 'several')}</p>
        </div>
      </div>
      <div className="grid content-start gap-3">
        <div className="flex flex-wrap gap-2">
          {likely.map((pick) => (
            <CandidateButton key={pick.frameId} pick={pick} sheets={sheets} busy={busy} onChoose={() => answer(pick.frameId)} />
          ))}
        </div>
        <OtherAnswers list={list} final={final} sheets={sheets} busy={busy} onAnswer={answer} />
      </div>
    </li>
  );
}

interface CandidateProps {
  pick: PickForFinal;
  sheets: number;
  busy: boolean;
  onChoose: () => void;
}

function CandidateButton({ pick, sheets, busy, onChoose }: CandidateProps) {
  return (
    <button
      type="button"
      disabled={busy}
      onClick={onChoose}
      className="flex max-w-full items-center gap-3 border border-ink bg-sheet p-2 text-left hover:bg-hair disabled:opacity-70"
    >
      <Thumb {...pick} box={{ width: 96, height: 64 }} />
      <span className="min-w-0 text-13">
        <b className="block">It is this</b>
        <span className="break-words">{pickWords(pick, sheets)}</span>
        {pick.finalId ? <span className="block text-mute">becomes its newest version</span> : null}
      </span>
    </button>
  );
}

interface OtherProps {
  list: FinalList;
  final: FinalItem;
  sheets: number;
  busy: boolean;
  onAnswer: (frameId: string | null) => void;
}

function OtherAnswers({ list, final, sheets, busy, onAnswer }: OtherProps) {
  const [chosen, setChosen] = useState('');
  const choices = [
    { value: '', words: 'Choose a pick …' },
    ...list.picks.map((pick) => ({ value: pick.frameId, words: `${pickWords(pick, sheets)}${pick.finalId ? ' (has a final)' : ''}` })),
  ];
  return (
    <div className="flex flex-wrap items-end gap-2">
      <Field label={final.candidates.length > 0 ? 'Another pick' : 'Its pick'} className="min-w-0 flex-1 basis-64">
        {(control) => (
          <Select {...control} className="w-full" choices={choices} value={chosen} onChange={(event) => setChosen(event.target.value)} />
        )}
      </Field>
      <Button disabled={chosen === '' || busy} onClick={() => onAnswer(chosen)}>
        It is this one
      </Button>
      <Button disabled={busy} onClick={() => onAnswer(null)}>
        Not one of the picks
      </Button>
    </div>
  );
}
