import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { ClientDetail, Contact } from '../../../../api/contract/clients.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { DataTable } from '../../ui/data-table.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { ContactDialog } from './contact-dialog.tsx';
import { clientKeys } from './queries.ts';

/** The people at a client, with what can be done about them. */
export function ContactsTable({ client }: { client: ClientDetail }) {
  const queries = useQueryClient();
  const [shown, setShown] = useState<Contact | 'new' | null>(null);
  const renew = () => void queries.invalidateQueries({ queryKey: clientKeys.all });
  const add = (contact: Contact) => api.post(`/api/clients/${client.id}/contacts`, contact).then(renew);
  const remove = async (contact: Contact) => {
    try {
      await api.delete(`/api/clients/${client.id}/contacts/${contact.id}`);
      showNotice(`${contact.name} is deleted.`, { undo: () => void add(contact) });
    } catch (error) {
      showNotice((error as Error).message, { tone: 'problem' });
    }
    renew();
  };
  return (
    <section className="mt-6">
      <div className="mb-2 flex items-center justify-between gap-3">
        <h2 className="text-17">Contacts</h2>
        {client.can.edit ? (
          <Button size="small" onClick={() => setShown('new')}>
            Add contact
          </Button>
        ) : null}
      </div>
      {client.contacts.length === 0 ? (
        <EmptyState title="No contacts yet">The people who look at proofs and fetch deliveries.</EmptyState>
      ) : (
        <DataTable
          caption={`Contacts of ${client.name}`}
          rows={client.contacts}
          rowKey={(contact) => contact.id}
          columns={[
            { key: 'name', words: 'Name', cell: (contact) => <b>{contact.name}</b> },
            { key: 'position', words: 'Position', cell: (contact) => contact.position || '–' },
            { key: 'email', words: 'E-mail address', cell: (contact) => contact.email },
            { key: 'telephone', words: 'Telephone', cell: (contact) => contact.telephone || '–' },
            {
              key: 'do',
              words: 'Change',
              align: 'right',
              cell: (contact) => (
                <span className="flex justify-end gap-2">
                  <Button size="small" aria-label={`Change ${contact.name}`} onClick={() => setShown(contact)}>
                    Change
                  </Button>
                  <Button size="small" tone="danger" aria-label={`Delete ${contact.name}`} onClick={() => void remove(contact)}>
                    Delete
                  </Button>
                </span>
              ),
            },
          ]}
        />
      )}
      {shown ? (
        <ContactDialog clientId={client.id} contact={shown === 'new' ? null : shown} onClose={() => setShown(null)} onSaved={renew} />
      ) : null}
    </section>
  );
}
