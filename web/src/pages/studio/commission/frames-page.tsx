import { useCallback, useMemo, useRef, useState } from 'react';
import { Outlet, useNavigate } from 'react-router-dom';
import { useQuery } from '@tanstack/react-query';
import type { FrameItem } from '../../../../../api/contract/frames.ts';
import { useFrameActions, type FrameActions } from '../../../features/frames/actions.ts';
import { DeleteDialog } from '../../../features/frames/delete-dialog.tsx';
import { FrameGrid, type FrameGridHandle } from '../../../features/frames/frame-grid.tsx';
import { FrameToolbar } from '../../../features/frames/frame-toolbar.tsx';
import { KeysDialog } from '../../../features/frames/keys-dialog.tsx';
import { NoFrames, NoneFound } from '../../../features/frames/no-frames.tsx';
import { frameSummaryQuery } from '../../../features/frames/queries.ts';
import { chooseAll, chooseNone, keepShown, NOTHING, type Selection } from '../../../features/frames/selection.ts';
import { SelectionBar } from '../../../features/frames/selection-bar.tsx';
import { useFrameWish } from '../../../features/frames/use-frame-wish.ts';
import { useFrames, useViewTitles } from '../../../features/frames/use-frames.ts';
import { useHeight } from '../../../features/frames/use-height.ts';
import { useLiveFrames } from '../../../features/frames/use-live-frames.ts';
import { UploadPanel } from '../../../features/uploads/upload-panel.tsx';
import { useCommissionUploads } from '../../../features/uploads/use-commission-uploads.ts';
import { useUploadTotals } from '../../../features/uploads/use-uploads.ts';
import { Button } from '../../../ui/button.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import { useCommission } from './layout.tsx';

/** What the page of one frame shares with the page of all, above which it lies. */
export interface FramesOutlet {
  all: readonly FrameItem[];
  shown: readonly FrameItem[];
  views: ReadonlyMap<string, { title: string; number: number }>;
  actions: FrameActions;
  /** Whether frames may be changed, and whether those shown were deleted. */
  can: boolean;
  deleted: boolean;
  /** Opens another frame, or goes back to all of them with the focus on the one that was looked at. */
  go: (id: string) => void;
  close: (id: string) => void;
}

const NO_WISH = { view: '', text: '', shown: 'visible' } as const;

/** /commissions/:commissionId/frames */
export function Component() {
  const commission = useCommission();
  const { id } = commission;
  const queue = useCommissionUploads(id, 'frame');
  const uploading = useUploadTotals(queue).running;
  useLiveFrames(id);
  const [wish, setWish, search] = useFrameWish();
  const { query, all, shown } = useFrames(id, wish);
  const summary = useQuery(frameSummaryQuery(id)).data;
  const views = useViewTitles(id);
  const actions = useFrameActions(id);
  const [selection, setSelection, chosen] = useShownSelection(shown);
  const [asking, setAsking] = useState<'delete' | 'keys' | null>(null);
  const [aboveRef, aboveHeight] = useHeight();
  const grid = useRef<FrameGridHandle>(null);
  const { addressOf, open, outlet } = useWays(id, search, grid, setSelection);
  const deleted = wish.shown === 'deleted';
  const can = commission.closedAt === null;
  const askToDelete = () => can && !deleted && chosen.length > 0 && setAsking('delete');

  return (
    <>
      <PageTitle title="Frames" where={commission.title} hidden />
      <div ref={aboveRef} className="grid gap-5 pb-4">
        {can ? <UploadPanel queue={queue} noun={{ one: 'frame', many: 'frames' }} /> : null}
        {all.length > 0 || deleted || (summary?.deleted ?? 0) > 0 ? (
          <FrameToolbar
            summary={summary}
            wish={wish}
            onWish={setWish}
            views={views}
            shown={shown.length}
            chosen={chosen.length}
            onAll={() =>
              setSelection(
                chooseAll(
                  selection,
                  shown.map((frame) => frame.id),
                ),
              )
            }
          />
        ) : null}
      </div>
      <QueryView
        query={query}
        isEmpty={() => all.length === 0 && !query.hasNextPage && !deleted}
        empty={<NoFrames uploading={uploading} />}
      >
        {() => (
          <section aria-label="All frames" className="border-t border-ink pt-2.5">
            <p className="flex items-center justify-between pb-1.5">
              <span>
                <b>Frames</b> <span className="text-mute">· {query.hasNextPage ? `${all.length} so far, loading …` : shown.length}</span>
              </span>
              <Button size="small" tone="quiet" onClick={() => setAsking('keys')}>
                Keys
              </Button>
            </p>
            {shown.length === 0 && !query.hasNextPage ? <NoneFound onAll={() => setWish(NO_WISH)} /> : null}
            <FrameGrid
              ref={grid}
              frames={shown}
              selection={selection}
              onSelection={setSelection}
              views={views}
              addressOf={addressOf}
              onOpen={open}
              onDelete={askToDelete}
              onKeys={() => setAsking('keys')}
              above={aboveHeight}
            />
          </section>
        )}
      </QueryView>
      {can && chosen.length > 0 ? (
        <SelectionBar
          commissionId={id}
          frames={chosen}
          views={views}
          actions={actions}
          deleted={deleted}
          onDelete={askToDelete}
          onNone={() => setSelection(chooseNone(selection))}
        />
      ) : null}
      <DeleteDialog
        open={asking === 'delete'}
        frames={chosen}
        onDelete={async () => void (await actions.remove(chosen.map((frame) => frame.id)))}
        onClose={() => setAsking(null)}
      />
      <KeysDialog open={asking === 'keys'} onClose={() => setAsking(null)} />
      <Outlet context={{ all, shown, views, actions, can, deleted, ...outlet } satisfies FramesOutlet} />
    </>
  );
}

/** The selection among what is shown now, and the chosen frames in their order. */
function useShownSelection(shown: readonly FrameItem[]): [Selection, (next: Selection) => void, FrameItem[]] {
  const [kept, setKept] = useState(NOTHING);
  const order = useMemo(() => shown.map((frame) => frame.id), [shown]);
  const selection = useMemo(() => keepShown(kept, order), [kept, order]);
  const chosen = useMemo(() => shown.filter((frame) => selection.chosen.has(frame.id)), [shown, selection.chosen]);
  return [selection, setKept, chosen];
}

/** The ways between the grid and one frame; the wish in the address comes along. */
function useWays(id: string, search: string, grid: React.RefObject<FrameGridHandle | null>, focus: (selection: Selection) => void) {
  const navigate = useNavigate();
  const query = search === '' ? '' : `?${search}`;
  const addressOf = useCallback((frameId: string) => `/commissions/${id}/frames/${frameId}${query}`, [id, query]);
  const open = useCallback((frameId: string) => void navigate(addressOf(frameId)), [navigate, addressOf]);
  const go = useCallback((frameId: string) => void navigate(addressOf(frameId), { replace: true }), [navigate, addressOf]);
  const close = useCallback(
    (frameId: string) => {
      void navigate(`/commissions/${id}/frames${query}`);
      focus({ ...NOTHING, focus: frameId, anchor: frameId });
      // The large view must be gone before a tile below it can take the focus.
      requestAnimationFrame(() => grid.current?.focusFrame(frameId));
    },
    [navigate, id, query, focus, grid],
  );
  return { addressOf, open, outlet: { go, close } };
}
