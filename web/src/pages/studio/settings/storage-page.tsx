import { useQuery } from '@tanstack/react-query';
import { storageQuery } from '../../../features/studio/queries.ts';
import { StorageView } from '../../../features/studio/storage-view.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';

export function Component() {
  const storage = useQuery(storageQuery);
  return (
    <>
      <PageTitle title="Storage" where="Settings" className="mb-5 text-30" />
      <QueryView query={storage}>{(data) => <StorageView storage={data} />}</QueryView>
    </>
  );
}
