import { useCallback, useEffect, useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useLocation, useNavigate } from 'react-router-dom';
import type { GuestProof } from '../../../../api/contract/guest-sheets.ts';
import { formatPrice } from '../../lib/money.ts';
import { Keystone } from '../../ui/keystone.tsx';
import { marksOf } from '../marks/read-marks.ts';
import { noteLookedAt } from '../sheets-guest/looked-at.ts';
import { nameOfProof } from '../sheets-guest/name-of-proof.ts';
import { MarkButton } from '../sheets-guest/mark-button.tsx';
import type { SheetData } from '../sheets-guest/sheet-door.tsx';
import { nextSurround, useSurround } from '../sheets-guest/surround.ts';
import { GuideLines } from './guide-lines.tsx';
import { nextGuides, useGuides, type Guides } from './guides.ts';
import { KeysDialog } from './keys-dialog.tsx';
import { ProofPanel } from './proof-panel.tsx';
import { Stage, type StageHandle } from './stage.tsx';
import { useViewerKeys } from './use-viewer-keys.ts';
import { StepButton, ViewerBar } from './viewer-bar.tsx';

interface Props {
  data: SheetData;
  /** Place of the proof in the order of the sheet, from 0. */
  at: number;
}

function fetchAhead(proof: GuestProof | undefined): void {
  if (proof?.pictures) new Image().src = proof.pictures.large;
}

/** One proof large: its surround, its keystone, how it was shot, and the ways to its neighbours. */
export function ProofViewer({ data, at }: Props) {
  const { t } = useTranslation();
  const { sheet, proofs, marks, places, mark, storeys } = data;
  const proof = proofs[at] as GuestProof;
  const storey = storeys.find((one) => one.proofs.includes(proof));
  const said = marksOf(marks, proof.id);
  const place = places.get(proof.id);
  const [surround, setSurround] = useSurround('viewer');
  const [guides, setGuides] = useGuides();
  const [told, setTold] = useState('');
  const [isFull, setFull] = useState(false);
  const [asking, setAsking] = useState(false);
  const stage = useRef<StageHandle>(null);
  const { step, close } = useSteps(data, at);

  useEffect(() => noteLookedAt(sheet.id, proof.number), [sheet.id, proof.number]);

  const changeGuides = (next: Guides) => {
    setGuides(next);
    setTold(t('guides.now', { guides: t(`guides.${next}`) }));
  };
  const toggleMark = mark ? () => mark(proof, !said.mine) : undefined;
  useViewerKeys(
    {
      previous: () => step(-1),
      next: () => step(1),
      mark: () => toggleMark?.(),
      close,
      full: () => !isFull && stage.current?.toggle(),
      fit: () => stage.current?.fit(),
      surround: () => setSurround(nextSurround(surround)),
      guides: () => changeGuides(nextGuides(guides)),
      help: () => setAsking(true),
      pan: (x, y) => stage.current?.pan(x, y),
      isFull,
    },
    sheet.me.shortcuts,
  );

  const name = nameOfProof(t, { number: proof.number, view: storey?.title ?? '', marks: said, place });
  const people = [...(said.mine ? sheet.people.filter((one) => one.accountId === sheet.me.accountId) : []), ...said.others];
  return (
    <div data-surround={surround} className="flex min-h-dvh flex-col bg-paper text-ink lg:h-dvh">
      <ViewerBar
        sheet={sheet}
        proof={proof}
        view={storey?.view ? t('viewer.view', { number: storey.view, title: storey.title }) : t('sheet.alsoMade')}
        marks={said}
        place={place}
        surround={surround}
        onSurround={setSurround}
        guides={guides}
        onGuides={changeGuides}
        isFull={isFull}
        onFull={() => stage.current?.toggle()}
        onKeys={() => setAsking(true)}
        onClose={close}
        onMark={toggleMark}
      />
      <main id="content" tabIndex={-1} className="flex min-h-0 flex-1 flex-col lg:grid lg:grid-cols-[minmax(0,1fr)_320px]">
        <div className="relative flex h-[62dvh] flex-col lg:h-auto">
          <p role="status" className="sr-only">
            {name}
          </p>
          <p role="status" className="sr-only">
            {told}
          </p>
          <div className="relative min-h-0 flex-1 md:mx-16 md:mb-5">
            <Stage
              key={proof.id}
              ref={stage}
              picture={{ ...proof, medium: proof.pictures?.medium ?? null, large: proof.pictures?.large ?? null }}
              alt={name}
              mark={place ? <Keystone number={place.number} extra={place.extra} size="large" silent /> : undefined}
              over={<GuideLines guides={guides} />}
              onSwipe={(to) => step(to === 'next' ? 1 : -1)}
              onFull={setFull}
              onFailed={data.renewPictures}
              onShown={() => [proofs[at + 1], proofs[at - 1]].forEach(fetchAhead)}
            />
          </div>
          <div className="flex items-center justify-between gap-3 px-4 py-3 md:contents">
            <StepButton to="previous" disabled={at === 0} onClick={() => step(-1)} />
            {toggleMark ? (
              <MarkButton
                number={proof.number}
                marks={said}
                role={sheet.me.role}
                onMark={toggleMark}
                place={place?.number}
                extra={place?.extra ? formatPrice(sheet.extraPrice, sheet.currency) : undefined}
                className="flex-1 text-15 md:hidden"
              />
            ) : null}
            <StepButton to="next" disabled={at === proofs.length - 1} onClick={() => step(1)} />
          </div>
        </div>
        <aside
          aria-label={t('viewer.about')}
          className="flex-1 bg-paper px-5 py-4 lg:overflow-y-auto lg:border-l lg:border-ink"
          data-surround="paper"
        >
          <ProofPanel proof={proof} uses={sheet.uses} askedFor={storey?.askedFor ?? ''} people={people} me={sheet.me.accountId} />
        </aside>
      </main>
      <KeysDialog sheet={sheet} open={asking} onClose={() => setAsking(false)} />
    </div>
  );
}

/** Steps replace each other in the browser's history, so that Back leads to the sheet and not through every picture. */
function useSteps({ sheet, proofs }: SheetData, at: number) {
  const navigate = useNavigate();
  const { state } = useLocation();
  const cameFromSheet = (state as { fromSheet?: boolean } | null)?.fromSheet === true;
  const step = useCallback(
    (by: number) => {
      const next = proofs[at + by];
      if (next) void navigate(`/sheets/${sheet.id}/proofs/${next.number}`, { replace: true, state: { fromSheet: cameFromSheet } });
    },
    [proofs, at, navigate, sheet.id, cameFromSheet],
  );
  const close = useCallback(
    () => void (cameFromSheet ? navigate(-1) : navigate(`/sheets/${sheet.id}`)),
    [navigate, cameFromSheet, sheet.id],
  );
  return { step, close };
}
