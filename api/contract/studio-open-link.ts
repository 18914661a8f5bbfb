import { z } from 'zod';

/** The open link of a sheet, as the studio that switched it on sees it. */
export const StudioOpenLink = z.object({
  /** Where whoever has it looks; null where the installation's secret was changed since, so that it cannot be read any more. */
  address: z.string().nullable(),
  hasPassphrase: z.boolean(),
  /** "2026-11-17", the last day of the link itself; null: it ends with the sheet. */
  endsOn: z.string().nullable(),
  /** The moment at which it ends, by its own last day or the sheet's, whichever comes first. */
  endsAt: z.iso.datetime().nullable(),
  hasEnded: z.boolean(),
  switchedOnAt: z.iso.datetime(),
  /** Browsers that look by it at present. */
  lookers: z.number().int(),
});
export type StudioOpenLink = z.infer<typeof StudioOpenLink>;
