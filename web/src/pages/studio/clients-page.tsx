import { useInfiniteQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import type { ClientSummary } from '../../../../api/contract/clients.ts';
import { AddClientDialog } from '../../features/clients/add-client-dialog.tsx';
import { clientKeys, clientsQuery } from '../../features/clients/queries.ts';
import { SearchField } from '../../ui/search-field.tsx';
import { Button } from '../../ui/button.tsx';
import { DataTable } from '../../ui/data-table.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { MoreButton } from '../../ui/more-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { QueryView } from '../../ui/query-view.tsx';

/** /clients */
export function Component() {
  const [search, setSearch] = useState('');
  const [adding, setAdding] = useState(false);
  const query = useInfiniteQuery(clientsQuery(search));
  const queries = useQueryClient();
  const navigate = useNavigate();
  const add = (
    <Button tone="first" onClick={() => setAdding(true)}>
      Add client
    </Button>
  );
  return (
    <>
      <div className="mb-4 flex flex-wrap items-center justify-between gap-3">
        <PageTitle title="Clients" />
        {add}
      </div>
      <div className="mb-3">
        <SearchField label="Search clients and contacts" onSearch={setSearch} />
      </div>
      <QueryView
        query={query}
        isEmpty={({ pages }) => pages[0]?.items.length === 0}
        empty={
          search ? (
            <EmptyState title="Nobody found">No client and no contact has “{search}” in its name or address.</EmptyState>
          ) : (
            <EmptyState title="No clients yet" action={add}>
              The companies that commission pictures, with the people there.
            </EmptyState>
          )
        }
      >
        {({ pages }) => <ClientsTable clients={pages.flatMap((page) => page.items)} />}
      </QueryView>
      <MoreButton query={query} />
      <AddClientDialog
        open={adding}
        onClose={() => setAdding(false)}
        onAdded={(client) => {
          void queries.invalidateQueries({ queryKey: clientKeys.all });
          void navigate(`/clients/${client.id}`);
        }}
      />
    </>
  );
}

function ClientsTable({ clients }: { clients: ClientSummary[] }) {
  return (
    <DataTable
      caption="Clients by name"
      rows={clients}
      rowKey={(client) => client.id}
      columns={[
        {
          key: 'name',
          words: 'Client',
          cell: (client) => (
            <Link to={`/clients/${client.id}`} className="font-bold hover:underline">
              {client.name}
            </Link>
          ),
        },
        {
          key: 'contact',
          words: 'Contact',
          cell: ({ firstContact, contactCount }) =>
            firstContact ? `${firstContact}${contactCount > 1 ? ` and ${contactCount - 1} more` : ''}` : '–',
        },
        { key: 'commissions', words: 'Commissions', align: 'right', width: '140px', cell: (client) => client.commissionCount || '–' },
      ]}
    />
  );
}
