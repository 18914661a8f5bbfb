import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { CheckThresholds } from '../../../../../api/contract/checks.ts';
import type { StudioChecks } from '../../../../../api/contract/studios.ts';
import { checksKey, checksQuery } from '../../../features/checks/queries.ts';
import { ThresholdsForm } from '../../../features/checks/thresholds-form.tsx';
import { api } from '../../../lib/api.ts';
import { showNotice } from '../../../ui/notices.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';

/** /settings/checks: from where on frames are pointed out. */
export function Component() {
  const client = useQueryClient();
  const save = useMutation({
    mutationFn: (thresholds: CheckThresholds) => api.put<StudioChecks>('/api/studio/checks', { thresholds }),
    onSuccess: (checks) => {
      client.setQueryData(checksKey, checks);
      // What is pointed out on the frames follows at once.
      void client.invalidateQueries({ queryKey: ['commissions'] });
      void client.invalidateQueries({ queryKey: ['frames'] });
      showNotice('Saved. Frames are pointed out by this from now on.');
    },
  });
  return (
    <>
      <PageTitle title="Frame checks" where="Settings" className="mb-1 text-30" />
      <p className="mb-5 max-w-2xl text-mute">
        From where on something is pointed out on a frame. You see it on the Frames page; your clients never do.
      </p>
      <QueryView query={useQuery(checksQuery)}>{(checks) => <ThresholdsForm checks={checks} onSave={save.mutateAsync} />}</QueryView>
    </>
  );
}
