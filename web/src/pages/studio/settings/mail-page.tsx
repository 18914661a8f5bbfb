import { useSearchParams } from 'react-router-dom';
import { Outbox } from '../../../features/mail/outbox.tsx';
import type { MailFilter } from '../../../features/mail/queries.ts';
import { PageTitle } from '../../../ui/page-title.tsx';

export function Component() {
  const [search, setSearch] = useSearchParams();
  const state = (search.get('state') ?? 'all') as MailFilter;
  return (
    <>
      <PageTitle title="Mail" where="Settings" className="mb-1 text-30" />
      <p className="mb-5 text-mute">What the studio sent, and what is on its way.</p>
      <Outbox state={state} onState={(next) => setSearch(next === 'all' ? {} : { state: next }, { replace: true })} />
    </>
  );
}
