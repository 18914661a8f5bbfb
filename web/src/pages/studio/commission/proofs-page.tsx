import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { NavLink, useParams, useSearchParams } from 'react-router-dom';
import type { SheetSummary } from '../../../../../api/contract/sheets.ts';
import { useCommissionChanges } from '../../../features/commissions/live.ts';
import { useViewTitles } from '../../../features/frames/use-frames.ts';
import { GuestsPanel } from '../../../features/sheets/guests-panel.tsx';
import { OpenLinkPanel } from '../../../features/sheets/open-link-panel.tsx';
import { ProofsBoard } from '../../../features/sheets/proofs-board.tsx';
import { sheetKeys, sheetQuery, sheetsQuery } from '../../../features/sheets/queries.ts';
import { type SheetDialog, SheetHead } from '../../../features/sheets/sheet-head.tsx';
import { SheetTerms } from '../../../features/sheets/sheet-terms.tsx';
import { buttonClasses } from '../../../ui/button.tsx';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { LinkButton } from '../../../ui/link-button.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import { useCommission } from './layout.tsx';

/** /commissions/:commissionId/proofs and …/proofs/:sheetId */
export function Component() {
  const commission = useCommission();
  const { sheetId } = useParams();
  const client = useQueryClient();
  useCommissionChanges(commission.id, (change) => {
    const what = 'what' in change ? change.what : 'missed';
    if (['sheet', 'picks', 'brackets-changed', 'missed'].includes(String(what))) void client.invalidateQueries({ queryKey: ['sheets'] });
  });
  return (
    <>
      <PageTitle title="Proofs" where={commission.title} hidden />
      <QueryView
        query={useQuery(sheetsQuery(commission.id))}
        isEmpty={(data) => data.items.length === 0}
        empty={
          <EmptyState
            title="No proof sheet yet"
            action={<LinkButton to={`/commissions/${commission.id}/frames`}>Choose frames</LinkButton>}
          >
            Choose the frames your client shall see and put them on a proof sheet.
          </EmptyState>
        }
      >
        {({ items }) => {
          const shown = items.find((sheet) => sheet.id === sheetId) ?? items.at(-1);
          if (!shown) return null;
          return (
            <>
              {items.length > 1 ? <SheetTabs sheets={items} shown={shown.id} /> : null}
              <OneSheet key={shown.id} sheetId={shown.id} />
            </>
          );
        }}
      </QueryView>
    </>
  );
}

function SheetTabs({ sheets, shown }: { sheets: SheetSummary[]; shown: string }) {
  return (
    <nav aria-label="Proof sheets" className="mb-4 flex flex-wrap gap-2">
      {sheets.map((sheet) => (
        <NavLink
          key={sheet.id}
          to={`/commissions/${sheet.commissionId}/proofs/${sheet.id}`}
          aria-current={sheet.id === shown ? 'page' : undefined}
          className={buttonClasses(sheet.id === shown ? 'first' : 'plain', 'small')}
        >
          Sheet {sheet.number} · {sheet.withdrawnAt ? 'Taken back' : sheet.state}
        </NavLink>
      ))}
    </nav>
  );
}

function OneSheet({ sheetId }: { sheetId: string }) {
  const commission = useCommission();
  const views = useViewTitles(commission.id);
  // The desk's "Remind" leads here with its dialog open.
  const [search] = useSearchParams();
  const [dialog, setDialog] = useState<SheetDialog>(search.get('remind') === null ? null : 'remind');
  return (
    <QueryView query={useQuery({ ...sheetQuery(sheetId), queryKey: sheetKeys.one(sheetId) })}>
      {(sheet) => (
        <div className="grid gap-5">
          <SheetHead sheet={sheet} clientId={commission.client.id} dialog={dialog} onDialog={setDialog} />
          <div className="grid items-start gap-6 lg:grid-cols-[minmax(0,1fr)_320px]">
            <div className="min-w-0">
              {sheet.proofs.length === 0 ? (
                <EmptyState
                  title="No proof on this sheet"
                  action={<LinkButton to={`/commissions/${commission.id}/frames`}>Choose frames</LinkButton>}
                >
                  Put frames on it under Frames.
                </EmptyState>
              ) : (
                <ProofsBoard sheet={sheet} views={views} />
              )}
            </div>
            <aside className="grid gap-4 max-lg:order-first max-lg:md:grid-cols-2">
              <section aria-labelledby="terms-of-sheet" className="border border-ink bg-sheet px-4.5 py-4">
                <h2 id="terms-of-sheet" className="mb-3 text-17">
                  Terms
                </h2>
                <SheetTerms sheet={sheet} />
              </section>
              <GuestsPanel sheet={sheet} onInvite={() => setDialog('invite')} />
              <OpenLinkPanel sheet={sheet} />
            </aside>
          </div>
        </div>
      )}
    </QueryView>
  );
}
