import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { StudioUses } from '../../../../../api/contract/studios.ts';
import type { Use } from '../../../../../api/domain/fit-for-use.ts';
import { usesKey, usesQuery } from '../../../features/uses/queries.ts';
import { UsesTable } from '../../../features/uses/uses-table.tsx';
import { api } from '../../../lib/api.ts';
import { showNotice } from '../../../ui/notices.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';

/** /settings/uses: what the studio's pictures are wanted for. */
export function Component() {
  const client = useQueryClient();
  const save = useMutation({
    mutationFn: (uses: Use[]) => api.put<StudioUses>('/api/studio/uses', { uses }),
    onSuccess: (list) => client.setQueryData(usesKey, list),
  });
  const change = async (uses: Use[], says: string) => {
    const before = client.getQueryData<StudioUses>(usesKey)?.uses;
    await save.mutateAsync(uses);
    if (says && before) showNotice(says, { undo: () => save.mutate(before) });
  };
  return (
    <>
      <PageTitle title="Uses" where="Settings" className="mb-1 text-30" />
      <p className="mb-5 max-w-2xl text-mute">
        What your clients want pictures for. Every proof and final is measured against these, for you and for them: sharp, or how large it
        can be.
      </p>
      {save.error ? (
        <p role="alert" className="mb-4 border border-copper bg-sheet px-4 py-2 font-bold text-copper">
          {save.error.message}
        </p>
      ) : null}
      <QueryView query={useQuery(usesQuery)}>{(list) => <UsesTable list={list} busy={save.isPending} onChange={change} />}</QueryView>
    </>
  );
}
