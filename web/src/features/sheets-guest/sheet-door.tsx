import { useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { lazy, Suspense, useCallback, useEffect, useMemo, useState, type ReactNode } from 'react';
import type { GuestProofs, GuestSheet, SheetMarks } from '../../../../api/contract/guest-sheets.ts';
import type { ApiProblem } from '../../lib/api.ts';
import { useLive } from '../../lib/live.ts';
import { QueryView } from '../../ui/query-view.tsx';
import { numberPicks, readMarks } from '../marks/read-marks.ts';
import { useMarks } from '../marks/use-marks.ts';
import { GuestRefused } from './guest-refused.tsx';
import { eventsAddress, marksQuery, proofsQuery, sheetKeys, sheetQuery } from './queries.ts';
import { readStoreys } from './sheet-rows.ts';

const AskDialog = lazy(() => import('../open-links/ask-dialog.tsx'));

/** Changes of one second are read together, so that 200 guests marking at once are no storm of requests. */
const GATHER = 800;

/** Everything a page of a sheet draws from. */
export type SheetData = ReturnType<typeof useSheetData>;

interface Props {
  sheetId: string;
  children: (data: SheetData) => ReactNode;
}

/** The door to a sheet: its three answers, kept up to date while the page is open. */
export function SheetDoor({ sheetId, children }: Props) {
  const sheet = useQuery(sheetQuery(sheetId));
  const proofs = useQuery(proofsQuery(sheetId));
  const marks = useQuery(marksQuery(sheetId));
  useSheetLive(sheetId, sheet.isSuccess);
  const failed = (error: Error) => <GuestRefused error={error} />;
  // Whoever looked by a link that was withdrawn sees nothing more, not even what is drawn already.
  if ((sheet.error as ApiProblem | null)?.code === 'look') return failed(sheet.error as ApiProblem);
  return (
    <QueryView query={sheet} failed={failed}>
      {(sheetNow) => (
        <QueryView query={proofs} failed={failed}>
          {(proofsNow) => (
            <QueryView query={marks} failed={failed}>
              {(marksNow) => (
                <SheetInside sheet={sheetNow} proofs={proofsNow} marks={marksNow}>
                  {children}
                </SheetInside>
              )}
            </QueryView>
          )}
        </QueryView>
      )}
    </QueryView>
  );
}

interface InsideProps {
  sheet: GuestSheet;
  proofs: GuestProofs;
  marks: SheetMarks;
  children: (data: SheetData) => ReactNode;
}

function SheetInside({ sheet, proofs, marks, children }: InsideProps) {
  const [asking, setAsking] = useState(false);
  return (
    <>
      {children(useSheetData(sheet, proofs, marks, setAsking))}
      {asking && sheet.can.ask ? (
        <Suspense>
          <AskDialog sheet={sheet} onClose={() => setAsking(false)} />
        </Suspense>
      ) : null}
    </>
  );
}

function useSheetData(sheet: GuestSheet, answer: GuestProofs, serverMarks: SheetMarks, setAsking: (asking: boolean) => void) {
  const queryClient = useQueryClient();
  const { marks, mark } = useMarks(sheet, serverMarks.marks);
  const read = useMemo(() => readMarks(marks, sheet.people, sheet.me.accountId), [marks, sheet.people, sheet.me.accountId]);
  const storeys = useMemo(() => readStoreys(answer), [answer]);
  const proofs = useMemo(() => storeys.flatMap((storey) => storey.proofs), [storeys]);
  const places = useMemo(() => numberPicks(proofs, read, sheet.allowance), [proofs, read, sheet.allowance]);

  useEffect(() => {
    if (sheet.revision > answer.revision) void queryClient.invalidateQueries({ queryKey: sheetKeys.proofs(sheet.id) });
  }, [sheet.revision, sheet.id, answer.revision, queryClient]);

  const renewPictures = useRenewPictures(queryClient, sheet.id);
  /** For somebody who looks: to mark they have to say who they are. */
  const ask = useCallback(() => setAsking(true), [setAsking]);
  return { sheet, storeys, proofs, marks: read, places, mark: sheet.can.mark ? mark : sheet.can.ask ? ask : undefined, ask, renewPictures };
}

/** The addresses of pictures end after some hours; an open page asks for new ones, at most once in half a minute. */
function useRenewPictures(queryClient: QueryClient, sheetId: string) {
  return useCallback(() => {
    const key = sheetKeys.proofs(sheetId);
    const age = Date.now() - (queryClient.getQueryState(key)?.dataUpdatedAt ?? 0);
    if (age > 30_000) void queryClient.invalidateQueries({ queryKey: key });
  }, [queryClient, sheetId]);
}

/** Reads anew what another guest, or the studio, has changed. The proofs themselves follow by the sheet's revision. */
function useSheetLive(sheetId: string, ready: boolean): void {
  const queryClient = useQueryClient();
  const gather = useMemo(() => gatherer((key) => void queryClient.invalidateQueries({ queryKey: key })), [queryClient]);
  useEffect(() => gather.stop, [gather]);
  useLive(ready ? eventsAddress(sheetId) : undefined, (change) => {
    gather.add(sheetKeys.marks(sheetId));
    if ('what' in change && change.what === 'marks') return;
    gather.add(sheetKeys.sheet(sheetId));
    gather.add(sheetKeys.pickLists(sheetId));
  });
}

function gatherer(ask: (key: readonly string[]) => void) {
  const waiting = new Map<string, readonly string[]>();
  let timer: ReturnType<typeof setTimeout> | undefined;
  return {
    add(key: readonly string[]) {
      waiting.set(key.join('/'), key);
      timer ??= setTimeout(() => {
        timer = undefined;
        waiting.forEach(ask);
        waiting.clear();
      }, GATHER);
    },
    stop: () => clearTimeout(timer),
  };
}
