import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import type { MineRow } from '../../../../api/contract/guests.ts';
import { guestQuery, mineQuery } from '../../features/guests/queries.ts';
import { GuestRefused } from '../../features/sheets-guest/guest-refused.tsx';
import { api } from '../../lib/api.ts';
import { formatDay } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { Pending } from '../../ui/pending.tsx';
import { Failure } from '../../ui/query-view.tsx';
import '../../messages/beyond-sheet.ts';

/** Everything this guest was ever invited to, of every studio. */
export function Component() {
  const { t } = useTranslation();
  const guest = useQuery(guestQuery);
  const mine = useInfiniteQuery(mineQuery);
  const error = guest.error ?? (mine.data ? null : mine.error);
  if (error) return <GuestRefused error={error} onRetry={() => void Promise.all([guest.refetch(), mine.refetch()])} />;
  if (!guest.data || !mine.data) return <Pending />;
  const rows = mine.data.pages.flatMap((page) => page.items);
  return (
    <GuestShell aside={<SignOut name={guest.data.name} />}>
      <PageTitle title={t('mine.title')} className="mb-4 text-30" />
      {rows.length === 0 ? (
        <EmptyState title={t('mine.emptyTitle')}>{t('mine.empty')}</EmptyState>
      ) : (
        <ul className="border-t border-ink">
          {rows.map((row) => (
            <MineLine key={`${row.kind}/${row.id}`} row={row} />
          ))}
        </ul>
      )}
      {mine.error ? <Failure error={mine.error} onRetry={() => void mine.fetchNextPage()} /> : null}
      {mine.hasNextPage && !mine.error ? (
        <Button className="mt-5 self-start" busy={mine.isFetchingNextPage} onClick={() => void mine.fetchNextPage()}>
          {t('mine.more')}
        </Button>
      ) : null}
    </GuestShell>
  );
}

function SignOut({ name }: { name: string }) {
  const { t } = useTranslation();
  const queryClient = useQueryClient();
  const signOut = useMutation({
    mutationFn: () => api.post('/api/guest/sign-out'),
    onSuccess: () => {
      queryClient.clear();
      window.location.assign('/mine');
    },
  });
  return (
    <>
      <span className="truncate">{name}</span>
      <Button size="small" busy={signOut.isPending} onClick={() => signOut.mutate()}>
        {t('mine.signOut')}
      </Button>
    </>
  );
}

/** A time that ends at midnight has the day before as its last. */
function lastDay(endsAt: string, timeZone: string): string {
  return formatDay(new Date(Date.parse(endsAt) - 1).toISOString(), timeZone);
}

function MineLine({ row }: { row: MineRow }) {
  const { t } = useTranslation();
  const over = row.state === 'Ended' || row.state === 'Withdrawn';
  const title = row.goTo ? (
    <Link to={row.goTo} className="text-17 font-bold underline-offset-4 after:absolute after:inset-0 hover:underline">
      {row.title}
    </Link>
  ) : (
    <span className="text-17 font-bold text-mute">{row.title}</span>
  );
  return (
    <li
      className={`relative grid gap-x-6 gap-y-0.5 border-b border-line px-4 py-3 lg:grid-cols-[minmax(0,1fr)_200px_180px_160px] lg:items-center ${row.goTo ? 'bg-sheet' : ''}`}
    >
      <div className="min-w-0">
        <p className="lettering">{t(`mine.${row.kind}`, { number: row.number })}</p>
        {title}
      </div>
      <p>{row.studio}</p>
      <p className={over ? 'text-mute' : 'font-bold'}>{t(`mine.state.${row.state}`)}</p>
      <p className="text-13 text-mute">
        {row.endsAt && !over && row.state !== 'Sent' ? t('mine.until', { day: lastDay(row.endsAt, row.timeZone) }) : ''}
      </p>
    </li>
  );
}
