import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import type { ClientDetail } from '../../../../api/contract/clients.ts';
import { ClientForm } from '../../features/clients/client-form.tsx';
import { ContactsTable } from '../../features/clients/contacts-table.tsx';
import { clientKeys, clientQuery } from '../../features/clients/queries.ts';
import { CommissionsTable } from '../../features/commissions/commissions-table.tsx';
import { commissionsQuery } from '../../features/commissions/queries.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { MoreButton } from '../../ui/more-button.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { QueryView } from '../../ui/query-view.tsx';

/** /clients/:clientId */
export function Component() {
  const { clientId = '' } = useParams();
  return <QueryView query={useQuery(clientQuery(clientId))}>{(client) => <ClientView key={client.id} client={client} />}</QueryView>;
}

function ClientView({ client }: { client: ClientDetail }) {
  return (
    <>
      <div className="mb-4 flex flex-wrap items-center justify-between gap-3">
        <PageTitle title={client.name} where="Clients" />
        <DeleteButton client={client} />
      </div>
      {client.deletedAt ? <p className="mb-4 font-bold text-copper">This client is deleted.</p> : <ClientForm client={client} />}
      <ContactsTable client={client} />
      <CommissionsOf client={client} />
    </>
  );
}

function DeleteButton({ client }: { client: ClientDetail }) {
  const queries = useQueryClient();
  const navigate = useNavigate();
  const renew = () => queries.invalidateQueries({ queryKey: clientKeys.all });
  const restore = useMutation({
    mutationFn: () => api.post(`/api/clients/${client.id}/restore`),
    onSuccess: renew,
    onError: (error) => showNotice(error.message, { tone: 'problem' }),
  });
  const remove = useMutation({
    mutationFn: () => api.delete(`/api/clients/${client.id}`),
    onSuccess: async () => {
      await navigate('/clients');
      showNotice(`${client.name} is deleted.`, { undo: () => restore.mutate() });
      void renew();
    },
    onError: (error) => showNotice(error.message, { tone: 'problem' }),
  });
  if (client.can.restore) {
    return (
      <Button busy={restore.isPending} onClick={() => restore.mutate()}>
        Bring back
      </Button>
    );
  }
  return (
    <Button tone="danger" busy={remove.isPending} onClick={() => remove.mutate()}>
      Delete client
    </Button>
  );
}

function CommissionsOf({ client }: { client: ClientDetail }) {
  const query = useInfiniteQuery(commissionsQuery({ clientId: client.id }));
  const begin = (
    <LinkButton to={`/commissions/new?client=${client.id}`} size="small">
      New commission
    </LinkButton>
  );
  return (
    <section className="mt-6">
      <div className="mb-2 flex items-center justify-between gap-3">
        <h2 className="text-17">Commissions</h2>
        {client.can.edit ? begin : null}
      </div>
      <QueryView
        query={query}
        isEmpty={({ pages }) => pages[0]?.items.length === 0}
        empty={<EmptyState title="No commissions yet">What {client.name} commissions will stand here.</EmptyState>}
      >
        {({ pages }) => <CommissionsTable commissions={pages.flatMap((page) => page.items)} withoutClient />}
      </QueryView>
      <MoreButton query={query} />
    </section>
  );
}
