import { z } from 'zod';

const named = {
  id: z.string().regex(/^[a-z0-9-]{1,40}$/, 'Small letters, digits and hyphens, at most 40.'),
  title: z.string().trim().min(1, 'Name the use.').max(60, 'At most 60 characters.'),
};
/** From a stamp to the side of a house, in millimetres. */
const length = z.number().min(10, 'At least 1 cm.').max(100_000, 'At most 100 m.');
const pixels = z.number().int('Whole pixels.').min(16, 'At least 16 px.').max(65_535, 'At most 65,535 px.');

/** What a picture is wanted for; the same shapes as domain/fit-for-use.ts. */
export const Use = z.discriminatedUnion('kind', [
  z.object({
    ...named,
    kind: z.literal('page'),
    widthMm: length,
    heightMm: length,
    ppi: z.number().min(10, 'At least 10 ppi.').max(2400, 'At most 2,400 ppi.'),
  }),
  z.object({ ...named, kind: z.literal('screen'), widthPx: pixels, heightPx: pixels }),
  z.object({
    ...named,
    kind: z.literal('seen-from'),
    widthMm: length,
    heightMm: length.nullable(),
    distanceMm: z.number().min(100, 'At least 10 cm.').max(1_000_000, 'At most 1 km.'),
  }),
]);

/** The studio's table of uses, in its order. */
export const Uses = z
  .array(Use)
  .max(40, 'At most 40 uses.')
  .refine((uses) => new Set(uses.map(({ id }) => id)).size === uses.length, 'Two uses have the same id.');
export type Uses = z.infer<typeof Uses>;
