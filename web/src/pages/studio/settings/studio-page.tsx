import { useMutation, useQueries, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { ChangeStudio, StudioSettings } from '../../../../../api/contract/studios.ts';
import { meKey } from '../../../features/sign-in/queries.ts';
import { currenciesQuery, studioKeys, studioQuery } from '../../../features/studio/queries.ts';
import { StudioForm } from '../../../features/studio/studio-form.tsx';
import { api, ApiProblem } from '../../../lib/api.ts';
import { Button } from '../../../ui/button.tsx';
import { showNotice } from '../../../ui/notices.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { Pending } from '../../../ui/pending.tsx';
import { Failure } from '../../../ui/query-view.tsx';

export function Component() {
  const queries = useQueryClient();
  const [studio, currencies] = useQueries({ queries: [studioQuery, currenciesQuery] });
  const [overtaken, setOvertaken] = useState(false);
  const [loads, setLoads] = useState(0);
  const change = useMutation({
    mutationFn: ({ wish, version }: { wish: ChangeStudio; version: number }) => api.patch<StudioSettings>('/api/studio', wish, { version }),
  });
  const error = studio.error ?? currencies.error;
  const save = async (wish: ChangeStudio, version: number): Promise<StudioSettings> => {
    try {
      const saved = await change.mutateAsync({ wish, version });
      queries.setQueryData(studioKeys.settings, saved);
      void queries.invalidateQueries({ queryKey: meKey });
      setOvertaken(false);
      showNotice('Saved.');
      return saved;
    } catch (problem) {
      if (problem instanceof ApiProblem && problem.status === 412) setOvertaken(true);
      throw problem;
    }
  };
  const loadPresent = async () => {
    await studio.refetch();
    setOvertaken(false);
    setLoads((count) => count + 1);
  };
  return (
    <>
      <PageTitle title="Studio" where="Settings" className="mb-5 text-30" />
      {error && !(studio.data && currencies.data) ? (
        <Failure error={error} onRetry={() => void Promise.all([studio.refetch(), currencies.refetch()])} />
      ) : studio.data && currencies.data ? (
        <>
          {overtaken ? (
            <p className="mb-4 max-w-xl">
              <Button onClick={() => void loadPresent()}>Load the present state, without what you typed</Button>
            </p>
          ) : null}
          <StudioForm key={loads} studio={studio.data} currencies={currencies.data.items} onSave={save} />
        </>
      ) : (
        <Pending />
      )}
    </>
  );
}
