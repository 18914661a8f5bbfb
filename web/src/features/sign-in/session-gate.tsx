import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Navigate, useLocation } from 'react-router-dom';
import type { Me } from '../../../../api/contract/sign-in.ts';
import { ApiProblem } from '../../lib/api.ts';
import { Pending } from '../../ui/pending.tsx';
import { Failure } from '../../ui/query-view.tsx';
import { signInAddress } from './next-address.ts';
import { meQuery } from './queries.ts';
import { useSessionEnd } from './use-session-end.ts';

/**
 * Lets people of a studio pass and sends others to sign in. Where a session ends while somebody is at work, the page stays as it is,
 * with what they typed, under a line that says so.
 */
export function SessionGate({ children }: { children: (me: Me) => ReactNode }) {
  useSessionEnd();
  const me = useQuery(meQuery);
  const location = useLocation();
  const ended = me.error instanceof ApiProblem && me.error.status === 401;
  if (me.isPending) return <Pending />;
  if (!me.data) {
    if (ended) return <Navigate to={signInAddress(location)} replace />;
    return (
      <main className="mx-auto max-w-xl p-6">
        <Failure error={me.error} onRetry={() => void me.refetch()} />
      </main>
    );
  }
  return (
    <>
      {ended ? (
        <p role="alert" className="sticky top-0 z-30 border-b border-copper bg-copper-soft px-4 py-2 font-bold text-copper">
          Your session has ended. What you typed is still here:{' '}
          <a href={signInAddress(location)} target="_blank" rel="noreferrer" className="underline underline-offset-4">
            sign in again in a new window
          </a>
          , then go on.
        </p>
      ) : null}
      {children(me.data)}
    </>
  );
}
