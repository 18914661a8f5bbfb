import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { useParams } from 'react-router-dom';
import { marksOf } from '../../features/marks/read-marks.ts';
import { PickRow } from '../../features/review/pick-row.tsx';
import { ReviewForm } from '../../features/review/review-form.tsx';
import { SentWords } from '../../features/review/sent-words.tsx';
import { SheetDoor, type SheetData } from '../../features/sheets-guest/sheet-door.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import '../../messages/beyond-sheet.ts';

/** The lead's last look before the picks go to the studio, and afterwards what was sent. */
export function Component() {
  const { sheetId = '' } = useParams();
  return (
    <SheetDoor key={sheetId} sheetId={sheetId}>
      {(data) => (
        <GuestShell studio={data.sheet.studio.name} aside={<span className="truncate">{data.sheet.commission.title}</span>}>
          {data.sheet.state === 'Sent' ? (
            <SentWords data={data} />
          ) : data.sheet.can.send ? (
            <Review data={data} />
          ) : (
            <NotYours data={data} />
          )}
        </GuestShell>
      )}
    </SheetDoor>
  );
}

function BackToSheet({ sheetId, children }: { sheetId: string; children: ReactNode }) {
  return (
    <LinkButton to={`/sheets/${sheetId}`} size="small">
      {children}
    </LinkButton>
  );
}

/** For a reviewer, or after the last date. */
function NotYours({ data: { sheet } }: { data: SheetData }) {
  const { t } = useTranslation();
  const why = sheet.state === 'Ended' ? t('sheet.endedTitle') : t('review.leadOnly');
  return (
    <div className="max-w-xl py-8">
      <PageTitle title={t('review.title')} />
      <p className="mt-3 mb-6">{why}</p>
      <BackToSheet sheetId={sheet.id}>{t('viewer.all')}</BackToSheet>
    </div>
  );
}

function Review({ data }: { data: SheetData }) {
  const { t } = useTranslation();
  const { sheet, storeys, proofs, marks, places, mark } = data;
  const picks = proofs.filter((proof) => places.has(proof.id));
  const without = storeys.filter((storey) => storey.view !== null && !storey.proofs.some((proof) => places.has(proof.id)));
  return (
    <div className="grid gap-x-10 gap-y-6 pb-10 lg:grid-cols-[minmax(0,1fr)_340px]">
      <div>
        <BackToSheet sheetId={sheet.id}>
          <span aria-hidden="true">←</span> {t('viewer.all')}
        </BackToSheet>
        <PageTitle title={t('review.title')} where={sheet.commission.title}>
          <span className="mt-4 block">{t('review.title')}</span>
        </PageTitle>
        {without.length > 0 ? (
          <p className="mt-3 border-l-4 border-copper bg-sheet px-4 py-2">
            {t('review.without', { count: without.length, views: without.map((storey) => storey.title).join('; ') })}
          </p>
        ) : null}
        {picks.length === 0 ? (
          <div className="mt-5">
            <EmptyState title={t('review.emptyTitle')}>{t('review.empty')}</EmptyState>
          </div>
        ) : (
          <ul className="mt-5 border-t border-ink" aria-label={t('review.picks')}>
            {picks.map((proof) => {
              const said = marksOf(marks, proof.id);
              const takeOff = () => {
                mark?.(proof, false);
                showNotice(t('review.tookOff', { number: proof.number }), { undo: () => mark?.(proof, true) });
              };
              return (
                <PickRow
                  key={proof.id}
                  proof={proof}
                  view={storeys.find((storey) => storey.proofs.includes(proof))?.title ?? ''}
                  place={places.get(proof.id) ?? { number: 0, extra: false }}
                  marks={said}
                  sheetId={sheet.id}
                  onTakeOff={said.mine && mark ? takeOff : undefined}
                />
              );
            })}
          </ul>
        )}
      </div>
      <ReviewForm data={data} picks={picks} />
    </div>
  );
}
