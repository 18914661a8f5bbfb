import type { ClientDetail, ClientSummary, Contact as ContactAnswer } from '../../contract/clients.ts';
import type { Client } from '../../models/Client.ts';
import type { Contact } from '../../models/Contact.ts';

export function presentContact(contact: Contact): ContactAnswer {
  const { id, name, email, position, telephone, version } = contact;
  return { id, name, email, position, telephone, version };
}

export function presentClient(client: Client, contacts: Contact[], commissionCount: number): ClientDetail {
  const present = client.deletedAt === null;
  return {
    id: client.id,
    name: client.name,
    remarks: client.remarks,
    contacts: contacts.map(presentContact),
    commissionCount,
    deletedAt: client.deletedAt?.toISOString() ?? null,
    version: client.version,
    can: { edit: present, remove: present && commissionCount === 0, restore: !present },
  };
}

/** A row of the list's question. */
export interface ClientLine {
  id: string;
  name: string;
  contactCount: number;
  firstContact: string | null;
  commissionCount: number;
  deletedAt: Date | null;
}

export function presentClientLine(row: ClientLine): ClientSummary {
  const { id, name, contactCount, firstContact, commissionCount } = row;
  return { id, name, contactCount, firstContact, commissionCount, deletedAt: row.deletedAt?.toISOString() ?? null };
}
