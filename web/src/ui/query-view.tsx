import type { UseQueryResult } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { ApiProblem } from '../lib/api.ts';
import { Button } from './button.tsx';
import { Pending } from './pending.tsx';

/** What went wrong, in a sentence, and the way to try again. */
export function Failure({ error, onRetry }: { error: unknown; onRetry?: () => void }) {
  const { t } = useTranslation();
  const canHelp = !(error instanceof ApiProblem) || ![403, 404, 410].includes(error.status);
  return (
    <div role="alert" className="border border-copper bg-sheet px-6 py-8">
      <p className="text-17 font-bold">{t('ui.failed')}</p>
      <p className="mt-1">{error instanceof ApiProblem ? error.detail : t('page.broken')}</p>
      {onRetry && canHelp ? (
        <Button className="mt-4" onClick={onRetry}>
          {t('ui.tryAgain')}
        </Button>
      ) : null}
    </div>
  );
}

interface Props<T> {
  query: UseQueryResult<T, Error>;
  /** True when the data holds nothing to show. */
  isEmpty?: (data: T) => boolean;
  /** Shown when it is empty: why, and the first action. */
  empty?: ReactNode;
  /** Shown while the first data is on its way. */
  pending?: ReactNode;
  /** Shown for failures that the page explains better itself; undefined leaves it to the usual words. */
  failed?: (error: Error) => ReactNode | undefined;
  children: (data: T) => ReactNode;
}

/**
 * The one door through which data comes onto a page: pending, failed, empty, or there. What was there stays while it is
 * asked for again, also when that fails: the failure then stands above it.
 */
export function QueryView<T>({ query, isEmpty, empty, pending, failed, children }: Props<T>) {
  const retry = () => void query.refetch();
  if (query.isPending) return <>{pending ?? <Pending />}</>;
  if (query.isError && query.data === undefined) return <>{failed?.(query.error) ?? <Failure error={query.error} onRetry={retry} />}</>;
  const data = query.data as T;
  return (
    <>
      {query.isError ? <Failure error={query.error} onRetry={retry} /> : null}
      {isEmpty?.(data) ? empty : children(data)}
    </>
  );
}
