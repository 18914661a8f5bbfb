import { useMemo, useRef, useState } from 'react';
import { Outlet } from 'react-router-dom';
import { useQuery } from '@tanstack/react-query';
import type { Bracket } from '../../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../../api/contract/frames.ts';
import { useFrameActions, type FrameActions } from '../../../features/frames/actions.ts';
import { useBracketActions } from '../../../features/frames/bracket-actions.ts';
import { DeleteDialog } from '../../../features/frames/delete-dialog.tsx';
import { FrameGrid, type FrameGridHandle } from '../../../features/frames/frame-grid.tsx';
import { FrameToolbar } from '../../../features/frames/frame-toolbar.tsx';
import { GRID_KEYS, KeysDialog } from '../../../features/frames/keys-dialog.tsx';
import { NoFrames, NoneFound } from '../../../features/frames/no-frames.tsx';
import { frameSummaryQuery } from '../../../features/frames/queries.ts';
import { SectionTools } from '../../../features/frames/section-tools.tsx';
import { countGroups } from '../../../features/frames/sections.ts';
import { chooseAll, chooseNone } from '../../../features/frames/selection.ts';
import { SelectionBar } from '../../../features/frames/selection-bar.tsx';
import { useFrameWish } from '../../../features/frames/use-frame-wish.ts';
import { useFrameWays } from '../../../features/frames/use-frame-ways.ts';
import { useFrames, useViewTitles } from '../../../features/frames/use-frames.ts';
import { useHeight } from '../../../features/frames/use-height.ts';
import { useLiveFrames } from '../../../features/frames/use-live-frames.ts';
import { useBrackets, useSections } from '../../../features/frames/use-sections.ts';
import { useShownSelection } from '../../../features/frames/use-shown-selection.ts';
import { UploadPanel } from '../../../features/uploads/upload-panel.tsx';
import { useCommissionUploads } from '../../../features/uploads/use-commission-uploads.ts';
import { useUploadTotals } from '../../../features/uploads/use-uploads.ts';
import { Button } from '../../../ui/button.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { Pending } from '../../../ui/pending.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import { useCommission } from './layout.tsx';

/** What the page of one frame shares with the page of all, above which it lies. */
export interface FramesOutlet {
  all: readonly FrameItem[];
  shown: readonly FrameItem[];
  brackets: ReadonlyMap<string, Bracket>;
  views: ReadonlyMap<string, { title: string; number: number }>;
  actions: FrameActions;
  /** Whether frames may be changed, and whether those shown were deleted. */
  can: boolean;
  deleted: boolean;
  /** Opens another frame (or the merged picture of the bracket it leads), or goes back to all of them with the focus on the one that was looked at. */
  go: (id: string, merged?: boolean) => void;
  close: (id: string) => void;
}

const NO_WISH = { view: '', text: '', shown: 'visible', group: 'all' } as const;

/** /commissions/:commissionId/frames */
export function Component() {
  const commission = useCommission();
  const { id } = commission;
  const queue = useCommissionUploads(id, 'frame');
  const uploading = useUploadTotals(queue).running;
  useLiveFrames(id);
  const [wish, setWish, search] = useFrameWish();
  const { query, all, found } = useFrames(id, wish);
  const { brackets, pending } = useBrackets(id);
  const { sections, shown } = useSections(found, brackets, wish);
  const summary = useQuery(frameSummaryQuery(id)).data;
  const views = useViewTitles(id);
  const actions = useFrameActions(id);
  const bracketActions = useBracketActions(id);
  const [selection, setSelection, chosen] = useShownSelection(shown);
  const [asking, setAsking] = useState<'delete' | 'keys' | null>(null);
  const [aboveRef, aboveHeight] = useHeight();
  const grid = useRef<FrameGridHandle>(null);
  const { addressOf, open, outlet } = useFrameWays(id, search, grid, setSelection);
  const deleted = wish.shown === 'deleted';
  const complete = query.isSuccess && !query.hasNextPage && !deleted;
  const counts = useMemo(() => (complete ? countGroups(all) : null), [complete, all]);
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
            counts={counts}
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
            {pending ? <Pending /> : null}
            {!pending && shown.length === 0 && !query.hasNextPage ? <NoneFound onAll={() => setWish(NO_WISH)} /> : null}
            <FrameGrid
              ref={grid}
              sections={pending ? [] : sections}
              selection={selection}
              onSelection={setSelection}
              views={views}
              addressOf={addressOf}
              onOpen={open}
              onDelete={askToDelete}
              onKeys={() => setAsking('keys')}
              toolsOf={(section) =>
                can ? <SectionTools section={section} views={views} actions={actions} bracketActions={bracketActions} /> : null
              }
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
          brackets={brackets}
          bracketActions={bracketActions}
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
      <KeysDialog title="Keys on this page" keys={GRID_KEYS} open={asking === 'keys'} onClose={() => setAsking(null)} />
      <Outlet context={{ all, shown, brackets, views, actions, can, deleted, ...outlet } satisfies FramesOutlet} />
    </>
  );
}
