import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { CommissionContents, CommissionDetail } from '../../../../api/contract/commissions.ts';
import { api } from '../../lib/api.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { commissionKeys, commissionQuery, contentsQuery } from './queries.ts';

/** Closing, reopening and deleting a commission. */
export function CommissionEnd({ commission }: { commission: CommissionDetail }) {
  const queries = useQueryClient();
  const [deleting, setDeleting] = useState(false);
  const turn = useMutation({
    mutationFn: (verb: 'close' | 'reopen') => api.post<CommissionDetail>(`/api/commissions/${commission.id}/${verb}`),
    onSuccess: (now) => {
      queries.setQueryData(commissionQuery(commission.id).queryKey, now);
      void queries.invalidateQueries({ queryKey: commissionKeys.lists });
    },
    onError: (error) => showNotice(error.message, { tone: 'problem' }),
  });
  const { reopen, remove } = commission.can;
  return (
    <section className="mt-6 border-t border-ink pt-3">
      <h2 className="text-17">{reopen ? 'This commission is closed' : 'When the work is done'}</h2>
      <p className="mt-1 max-w-xl text-mute">
        {reopen ? 'It is read-only until it is reopened.' : 'A closed commission is read-only and leaves the desk. It can be reopened.'}
      </p>
      <div className="mt-3 flex flex-wrap gap-2">
        <Button busy={turn.isPending} onClick={() => turn.mutate(reopen ? 'reopen' : 'close')}>
          {reopen ? 'Reopen commission' : 'Close commission'}
        </Button>
        {remove ? (
          <Button tone="danger" onClick={() => setDeleting(true)}>
            Delete commission
          </Button>
        ) : null}
      </div>
      {deleting ? <DeleteCommission commission={commission} onClose={() => setDeleting(false)} /> : null}
    </section>
  );
}

function DeleteCommission({ commission, onClose }: { commission: CommissionDetail; onClose: () => void }) {
  const queries = useQueryClient();
  const navigate = useNavigate();
  const contents = useQuery(contentsQuery(commission.id));
  const renew = () => void queries.invalidateQueries({ queryKey: commissionKeys.lists });
  const restore = () =>
    api
      .post(`/api/commissions/${commission.id}/restore`)
      .then(renew)
      .catch((error: unknown) => showNotice((error as Error).message, { tone: 'problem' }));
  const remove = useMutation({
    mutationFn: () => api.delete(`/api/commissions/${commission.id}`),
    onSuccess: async () => {
      await navigate('/commissions');
      // Not removed: a page that is just leaving would ask for it once more.
      void queries.invalidateQueries({ queryKey: commissionKeys.one(commission.id), refetchType: 'none' });
      renew();
      showNotice(`${commission.title} is deleted.`, { undo: () => void restore() });
    },
  });
  return (
    <ConfirmDialog
      open
      title={`Delete ${commission.title}`}
      confirm="Delete commission"
      busy={remove.isPending || contents.isPending}
      error={remove.error?.message}
      onConfirm={() => remove.mutate()}
      onClose={onClose}
    >
      <QueryView query={contents}>{(goes) => <WhatGoes goes={goes} />}</QueryView>
    </ConfirmDialog>
  );
}

function WhatGoes({ goes }: { goes: CommissionContents }) {
  const parts: [number, string, string][] = [
    [goes.frames, 'frame', 'frames'],
    [goes.sheets, 'proof sheet', 'proof sheets'],
    [goes.pickLists, 'pick list', 'pick lists'],
    [goes.finals, 'final', 'finals'],
    [goes.deliveries, 'delivery', 'deliveries'],
  ];
  const listed = parts.filter(([count]) => count > 0).map(([count, one, many]) => `${count} ${count === 1 ? one : many}`);
  return (
    <>
      <p>{listed.length > 0 ? 'With it go:' : 'It holds no frames, sheets or deliveries yet.'}</p>
      {listed.length > 0 ? (
        <ul className="mt-1 list-disc pl-5">
          {listed.map((words) => (
            <li key={words}>{words}</li>
          ))}
          <li>{formatBytes(goes.storedBytes)} of files</li>
        </ul>
      ) : null}
      <p className="mt-3">
        Every link to it stops working at once. For {goes.undoDays} days it can be brought back from the list of deleted commissions; after
        that it is gone for good.
      </p>
    </>
  );
}
