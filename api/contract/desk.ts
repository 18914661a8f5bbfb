import { z } from 'zod';
import type { Operation } from './operation.ts';

/** Whose move it is: the studio's, the client's, or nobody's. */
export const Whose = z.enum(['yours', 'theirs', 'settled']);
export type Whose = z.infer<typeof Whose>;

/** The moment beside a step: since when it waits, when it is due, how long is left. `at` is a day where only the day counts. */
export const DeskWhen = z.object({
  kind: z.enum(['since', 'due', 'left', 'ends', 'ended', 'shot']),
  at: z.string(),
  urgent: z.boolean(),
});
export type DeskWhen = z.infer<typeof DeskWhen>;

/** The button that does it: it goes to a step of the commission, or acts at once. */
export const DeskAction = z.object({
  words: z.string(),
  step: z.enum(['brief', 'frames', 'proofs', 'picks', 'finals', 'delivery']),
  /** Done right from the desk instead of going to the step. */
  does: z.enum(['remind', 'close']).nullable(),
  /** The sheet that the reminder is about. */
  sheetId: z.uuid().nullable(),
});
export type DeskAction = z.infer<typeof DeskAction>;

export const DeskRow = z.object({
  commission: z.object({ id: z.uuid(), title: z.string(), client: z.string() }),
  /** First proof or frame: the address of its small picture, its pixels and placeholder. */
  picture: z
    .object({ small: z.string(), width: z.number().int(), height: z.number().int(), placeholder: z.string().nullable() })
    .nullable(),
  says: z.string(),
  when: DeskWhen.nullable(),
  action: DeskAction,
});
export type DeskRow = z.infer<typeof DeskRow>;

/** At most 100 rows; `count` is how many there are. */
export const DeskGroup = z.object({ whose: Whose, count: z.number().int(), rows: z.array(DeskRow) });
export type DeskGroup = z.infer<typeof DeskGroup>;

export const Desk = z.object({
  figures: z.object({
    yours: z.number().int(),
    theirs: z.number().int(),
    /** Links of sheets and deliveries that end within seven days. */
    linksEnding: z.number().int(),
    storedBytes: z.number().int(),
    storageBytes: z.number().int(),
  }),
  groups: z.array(DeskGroup),
});
export type Desk = z.infer<typeof Desk>;

export const deskOperations: Operation[] = [
  { method: 'get', path: '/api/desk', summary: 'What is to be done next in every commission, and by whom', who: 'staff', answer: Desk },
];
