import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import type { ArchiveState } from '../../../../api/contract/deliveries.ts';
import type { PickListDetail } from '../../../../api/contract/pick-lists.ts';
import { api } from '../../lib/api.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { Button } from '../../ui/button.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { archiveQuery, pickKeys } from './queries.ts';

/** Has the archive of the picked originals built, and lets the browser fetch it as soon as it is there. */
export function OriginalsButton({ list }: { list: PickListDetail }) {
  const client = useQueryClient();
  const waiting = useRef(false);
  const ask = useMutation({
    mutationFn: () => api.post<ArchiveState>(`/api/pick-lists/${list.id}/archive`),
    onSuccess: (state) => client.setQueryData(pickKeys.archive(list.id), state),
    onError: (error) => showNotice(error.message, { tone: 'problem' }),
  });
  const state = useQuery(archiveQuery(list.id, ask.isSuccess)).data;
  useEffect(() => {
    if (!waiting.current || !state || state.state === 'building') return;
    waiting.current = false;
    if (state.state === 'ready') window.location.assign(`/api/pick-lists/${list.id}/archive/download`);
    else showNotice(state.problem ?? 'The archive could not be built. Please try again.', { tone: 'problem' });
  }, [state, list.id]);

  const building = ask.isPending || (ask.isSuccess && state?.state === 'building');
  const start = () => {
    waiting.current = true;
    ask.mutate();
  };
  return (
    <Button tone="first" size="small" busy={building} onClick={start}>
      <span aria-live="polite">{building ? progressWords(state) : `Download originals, ${formatBytes(list.originalsBytes)}`}</span>
    </Button>
  );
}

function progressWords(state: ArchiveState | undefined): string {
  if (!state?.size) return 'Packing the originals …';
  return `Packing: ${formatBytes(state.written)} of ${formatBytes(state.size)}`;
}
