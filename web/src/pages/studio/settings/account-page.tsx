import { useQuery } from '@tanstack/react-query';
import { AccountPanel } from '../../../features/sign-in/account-panel.tsx';
import { meQuery } from '../../../features/sign-in/queries.ts';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';

export function Component() {
  const me = useQuery(meQuery);
  return (
    <>
      <PageTitle title="Your account" where="Settings" className="mb-5 text-30" />
      <QueryView query={me}>{(data) => <AccountPanel me={data} />}</QueryView>
    </>
  );
}
