import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { CommissionDetail, View, Views } from '../../../../api/contract/commissions.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { commissionKeys, viewsQuery } from './queries.ts';
import { ViewDialog } from './view-dialog.tsx';
import { ViewRow } from './view-row.tsx';

/** The views of the brief as an ordered list: by buttons or by dragging. */
export function ViewsList({ commission }: { commission: CommissionDetail }) {
  const queries = useQueryClient();
  const key = viewsQuery(commission.id).queryKey;
  const [shown, setShown] = useState<View | 'new' | null>(null);
  const [going, setGoing] = useState<View | null>(null);
  const [dragged, setDragged] = useState<number | null>(null);
  const renew = () => void queries.invalidateQueries({ queryKey: commissionKeys.one(commission.id) });
  const order = useMutation({
    mutationFn: (views: View[]) =>
      api.put<Views>(`/api/commissions/${commission.id}/views/order`, { viewIds: views.map((view) => view.id) }),
    onMutate: (views) => queries.setQueryData(key, { items: views }),
    onSuccess: (views) => queries.setQueryData(key, views),
    onError: (error) => showNotice(error.message, { tone: 'problem' }),
    onSettled: renew,
  });
  const move = (views: View[], from: number, to: number) => {
    const next = [...views];
    const [view] = next.splice(from, 1);
    if (!view || to < 0 || to > next.length || from === to) return;
    next.splice(to, 0, view);
    order.mutate(next);
  };
  const { edit } = commission.can;
  const add = (
    <Button size="small" onClick={() => setShown('new')}>
      Add view
    </Button>
  );
  return (
    <section>
      <div className="mb-2 flex items-center justify-between gap-3">
        <h2 className="text-17">Views</h2>
        {edit ? add : null}
      </div>
      <QueryView
        query={useQuery(viewsQuery(commission.id))}
        isEmpty={({ items }) => items.length === 0}
        empty={
          <EmptyState title="No views yet">One line for each picture the brief asks for. Frames and proofs are hung under them.</EmptyState>
        }
      >
        {({ items }) => (
          <ol className="border border-ink bg-sheet">
            {items.map((view, at) => (
              <ViewRow
                key={view.id}
                view={view}
                number={at + 1}
                last={at === items.length - 1}
                editable={edit}
                onMove={(by) => move(items, at, at + by)}
                onChange={() => setShown(view)}
                onDelete={() => setGoing(view)}
                onDragStart={() => setDragged(at)}
                onDrop={() => {
                  if (dragged !== null) move(items, dragged, at);
                  setDragged(null);
                }}
              />
            ))}
          </ol>
        )}
      </QueryView>
      {shown ? (
        <ViewDialog commissionId={commission.id} view={shown === 'new' ? null : shown} onClose={() => setShown(null)} onSaved={renew} />
      ) : null}
      {going ? <DeleteView commissionId={commission.id} view={going} onClose={() => setGoing(null)} onDone={renew} /> : null}
    </section>
  );
}

interface DeleteProps {
  commissionId: string;
  view: View;
  onClose: () => void;
  onDone: () => void;
}

function DeleteView({ commissionId, view, onClose, onDone }: DeleteProps) {
  const remove = useMutation({
    mutationFn: () => api.delete(`/api/commissions/${commissionId}/views/${view.id}`),
    onSuccess: onClose,
    onSettled: onDone,
  });
  const hung = view.frames + view.proofs > 0;
  return (
    <ConfirmDialog
      open
      title={`Delete the view “${view.title}”`}
      confirm="Delete view"
      busy={remove.isPending}
      error={remove.error?.message}
      onConfirm={() => remove.mutate()}
      onClose={onClose}
    >
      {hung
        ? `${view.frames} ${view.frames === 1 ? 'frame' : 'frames'} and ${view.proofs} ${view.proofs === 1 ? 'proof' : 'proofs'} that hang under it move to “Also made”. Nothing else is lost.`
        : 'Nothing hangs under it.'}
    </ConfirmDialog>
  );
}
