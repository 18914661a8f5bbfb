import { useQuery } from '@tanstack/react-query';
import { teamQuery } from '../../../features/team/queries.ts';
import { TeamView } from '../../../features/team/team-view.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';

export function Component() {
  const team = useQuery(teamQuery);
  return (
    <>
      <PageTitle title="Team" where="Settings" className="mb-5 text-30" />
      <QueryView query={team}>{(data) => <TeamView team={data} />}</QueryView>
    </>
  );
}
