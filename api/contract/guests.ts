import { z } from 'zod';
import type { Operation } from './operation.ts';
import { Limit } from './paging.ts';
import { LinkToken, NameLine } from './person.ts';

export const OpenLink = z.object({ token: LinkToken });
export type OpenLink = z.infer<typeof OpenLink>;

/** Where the link leads: "/sheets/<id>" or "/deliveries/<id>". */
export const OpenedLink = z.object({ goTo: z.string() });
export type OpenedLink = z.infer<typeof OpenedLink>;

export const NewLink = z.object({ token: LinkToken });
export type NewLink = z.infer<typeof NewLink>;

/** Said whatever happened, so that nobody learns from it whom a link was sent to. */
export const Asked = z.object({ says: z.string() });
export type Asked = z.infer<typeof Asked>;

/** Who is a guest at this browser, whatever the studio. */
export const Guest = z.object({
  accountId: z.uuid(),
  name: z.string(),
  email: z.string(),
  /** Whether single keys act on pages. */
  shortcuts: z.boolean(),
});
export type Guest = z.infer<typeof Guest>;

/** A missing field means "leave". */
export const ChangeGuest = z.object({ name: NameLine.optional(), shortcuts: z.boolean().optional() });
export type ChangeGuest = z.infer<typeof ChangeGuest>;

export const ListMine = z.object({ after: z.string().max(500).optional(), limit: Limit });
export type ListMine = z.infer<typeof ListMine>;

/**
 * A sheet or delivery somebody was invited to. States of a sheet: Open, Sent, Ended; of a delivery: Ready, Fetched, Ended;
 * Withdrawn of both.
 */
export const MineRow = z.object({
  kind: z.enum(['sheet', 'delivery']),
  id: z.uuid(),
  /** The commission's title. */
  title: z.string(),
  number: z.number().int(),
  studio: z.string(),
  state: z.enum(['Open', 'Sent', 'Ready', 'Fetched', 'Ended', 'Withdrawn']),
  /** null for a recipient of a delivery. */
  role: z.enum(['lead', 'reviewer']).nullable(),
  invitedAt: z.iso.datetime(),
  /** The last moment to choose, or to fetch. */
  endsAt: z.iso.datetime().nullable(),
  /** In whose zone the last day is meant. */
  timeZone: z.string(),
  /** Null where the page cannot be opened any more. */
  goTo: z.string().nullable(),
});
export type MineRow = z.infer<typeof MineRow>;

export const MinePage = z.object({ items: z.array(MineRow), next: z.string().nullable() });
export type MinePage = z.infer<typeof MinePage>;

export const guestsOperations: Operation[] = [
  {
    method: 'post',
    path: '/api/open',
    summary: 'Open the link of an invitation: begins a guest session',
    who: 'anyone',
    body: OpenLink,
    answer: OpenedLink,
  },
  {
    method: 'post',
    path: '/api/new-link',
    summary: 'Ask for a new link in place of one that no longer opens; it is sent to the address the first one went to',
    who: 'anyone',
    body: NewLink,
    answer: Asked,
    status: 202,
  },
  { method: 'get', path: '/api/guest', summary: 'Who is a guest at this browser', who: 'guest', answer: Guest },
  {
    method: 'patch',
    path: '/api/guest',
    summary: "Change the guest's own name or the single-key shortcuts",
    who: 'guest',
    body: ChangeGuest,
    answer: Guest,
  },
  { method: 'post', path: '/api/guest/sign-out', summary: 'End the guest session of this browser', who: 'anyone', status: 204 },
  {
    method: 'get',
    path: '/api/mine',
    summary: 'Every sheet and delivery this guest was ever invited to, newest first',
    who: 'guest',
    query: ListMine,
    answer: MinePage,
  },
];
