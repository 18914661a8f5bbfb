import { z } from 'zod';
import { looksLikeCurrency } from '../domain/currencies.ts';
import { CheckThresholds } from './checks.ts';
import type { Operation } from './operation.ts';
import { EmailAddress, NameLine } from './person.ts';
import { TimeZone } from './time-zone.ts';
import { Uses } from './uses.ts';

export const StudioSettings = z.object({
  name: z.string(),
  /** Where answers to the studio's mails go. */
  replyTo: z.string(),
  timeZone: z.string(),
  /** ISO 4217; taken for new commissions. */
  currency: z.string(),
  version: z.number().int(),
  can: z.object({ change: z.boolean() }),
});
export type StudioSettings = z.infer<typeof StudioSettings>;

/** A missing field means "leave". */
export const ChangeStudio = z.object({
  name: NameLine.optional(),
  replyTo: EmailAddress.optional(),
  timeZone: TimeZone.optional(),
  currency: z.string().refine(looksLikeCurrency, 'A currency is three capital letters (ISO 4217).').optional(),
});
export type ChangeStudio = z.infer<typeof ChangeStudio>;

export const Currency = z.object({ code: z.string(), name: z.string(), digits: z.number().int() });
export type Currency = z.infer<typeof Currency>;

export const StoredKind = z.object({
  kind: z.enum(['frames', 'finals', 'archives', 'uploads']),
  files: z.number().int(),
  bytes: z.number().int(),
});
export type StoredKind = z.infer<typeof StoredKind>;

/** What the studio keeps in the store, in bytes. Previews are made by Oriel and not counted. */
export const StudioStorage = z.object({
  kinds: z.array(StoredKind),
  bytes: z.number().int(),
  limitBytes: z.number().int(),
});
export type StudioStorage = z.infer<typeof StudioStorage>;

/** From where on frames are pointed out, and from where where nobody changed it. */
export const StudioChecks = z.object({
  thresholds: CheckThresholds,
  defaults: CheckThresholds,
  can: z.object({ change: z.boolean() }),
});
export type StudioChecks = z.infer<typeof StudioChecks>;

export const ChangeChecks = z.object({ thresholds: CheckThresholds });
export type ChangeChecks = z.infer<typeof ChangeChecks>;

/** What the studio's clients want pictures for, and the list a studio begins with. */
export const StudioUses = z.object({ uses: Uses, defaults: Uses, can: z.object({ change: z.boolean() }) });
export type StudioUses = z.infer<typeof StudioUses>;

export const ChangeUses = z.object({ uses: Uses });
export type ChangeUses = z.infer<typeof ChangeUses>;

export const studiosOperations: Operation[] = [
  { method: 'get', path: '/api/studio', summary: "The studio's settings", who: 'staff', answer: StudioSettings },
  {
    method: 'patch',
    path: '/api/studio',
    summary: "Change the studio's settings",
    who: 'owner',
    ifMatch: true,
    body: ChangeStudio,
    answer: StudioSettings,
  },
  {
    method: 'get',
    path: '/api/currencies',
    summary: 'The currencies a studio can charge in (ISO 4217)',
    who: 'staff',
    answer: z.object({ items: z.array(Currency) }),
  },
  { method: 'get', path: '/api/studio/storage', summary: 'What is stored, by kind, and the limit', who: 'staff', answer: StudioStorage },
  { method: 'get', path: '/api/studio/checks', summary: 'From where on frames are pointed out', who: 'staff', answer: StudioChecks },
  {
    method: 'put',
    path: '/api/studio/checks',
    summary: 'Change from where on frames are pointed out',
    who: 'owner',
    body: ChangeChecks,
    answer: StudioChecks,
  },
  { method: 'get', path: '/api/studio/uses', summary: 'What pictures are wanted for', who: 'staff', answer: StudioUses },
  {
    method: 'put',
    path: '/api/studio/uses',
    summary: 'Change what pictures are wanted for',
    who: 'owner',
    body: ChangeUses,
    answer: StudioUses,
  },
];
