import { z } from 'zod';
import type { Operation } from './operation.ts';
import { Limit } from './paging.ts';

const Name = z.string().trim().min(1, 'Write the name.');

export const Contact = z.object({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  position: z.string(),
  telephone: z.string(),
  version: z.number().int(),
});
export type Contact = z.infer<typeof Contact>;

/** A client as a line of the list. */
export const ClientSummary = z.object({
  id: z.uuid(),
  name: z.string(),
  contactCount: z.number().int(),
  /** Name of the contact that was there first. */
  firstContact: z.string().nullable(),
  commissionCount: z.number().int(),
  deletedAt: z.iso.datetime().nullable(),
});
export type ClientSummary = z.infer<typeof ClientSummary>;

export const ClientDetail = z.object({
  id: z.uuid(),
  name: z.string(),
  remarks: z.string(),
  contacts: z.array(Contact),
  commissionCount: z.number().int(),
  deletedAt: z.iso.datetime().nullable(),
  version: z.number().int(),
  can: z.object({ edit: z.boolean(), remove: z.boolean(), restore: z.boolean() }),
});
export type ClientDetail = z.infer<typeof ClientDetail>;

export const ClientPage = z.object({ items: z.array(ClientSummary), next: z.string().nullable() });
export type ClientPage = z.infer<typeof ClientPage>;

export const ListClients = z.object({
  search: z.string().trim().max(200).optional(),
  after: z.string().max(2000).optional(),
  limit: Limit,
});
export type ListClients = z.infer<typeof ListClients>;

export const AddContact = z.object({
  name: Name.max(120, 'At most 120 characters.'),
  email: z.string().trim().toLowerCase().pipe(z.email('This is no e-mail address.').max(254, 'At most 254 characters.')),
  position: z.string().trim().max(120, 'At most 120 characters.').default(''),
  telephone: z.string().trim().max(60, 'At most 60 characters.').default(''),
});
export type AddContact = z.infer<typeof AddContact>;

/** A missing field means "leave". */
export const ChangeContact = z.object({
  name: AddContact.shape.name.optional(),
  email: AddContact.shape.email.optional(),
  position: AddContact.shape.position.removeDefault().optional(),
  telephone: AddContact.shape.telephone.removeDefault().optional(),
});
export type ChangeContact = z.infer<typeof ChangeContact>;

export const AddClient = z.object({
  name: Name.max(160, 'At most 160 characters.'),
  remarks: z.string().trim().max(8000, 'At most 8000 characters.').default(''),
  contacts: z.array(AddContact).max(50, 'At most 50 contacts.').default([]),
});
export type AddClient = z.infer<typeof AddClient>;

export const ChangeClient = z.object({
  name: AddClient.shape.name.optional(),
  remarks: AddClient.shape.remarks.removeDefault().optional(),
});
export type ChangeClient = z.infer<typeof ChangeClient>;

const client = '/api/clients/{clientId}';

export const clientOperations: Operation[] = [
  {
    method: 'get',
    path: '/api/clients',
    summary: 'The studio’s clients by name; search looks at names and contacts',
    who: 'staff',
    query: ListClients,
    answer: ClientPage,
  },
  { method: 'post', path: '/api/clients', summary: 'Add a client', who: 'staff', body: AddClient, answer: ClientDetail, status: 201 },
  { method: 'get', path: client, summary: 'A client with its contacts', who: 'staff', answer: ClientDetail },
  {
    method: 'patch',
    path: client,
    summary: 'Change name or remarks',
    who: 'staff',
    ifMatch: true,
    body: ChangeClient,
    answer: ClientDetail,
  },
  { method: 'delete', path: client, summary: 'Delete a client without commissions', who: 'staff', status: 204 },
  { method: 'post', path: `${client}/restore`, summary: 'Bring a deleted client back', who: 'staff', answer: ClientDetail },
  { method: 'post', path: `${client}/contacts`, summary: 'Add a contact', who: 'staff', body: AddContact, answer: Contact, status: 201 },
  {
    method: 'patch',
    path: `${client}/contacts/{contactId}`,
    summary: 'Change a contact',
    who: 'staff',
    ifMatch: true,
    body: ChangeContact,
    answer: Contact,
  },
  { method: 'delete', path: `${client}/contacts/{contactId}`, summary: 'Delete a contact', who: 'staff', status: 204 },
];
