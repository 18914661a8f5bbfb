import { z } from 'zod';
import { keyOf } from './page.ts';

const Key = z.tuple([z.iso.datetime(), z.uuid()]);

/**
 * A timestamptz column as text with all six digits: a Date keeps three, and a cursor made from it would show rows twice or not at all.
 * `column` is a name in the code, never something a person typed.
 */
export function momentText(column: string): string {
  return `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')`;
}

/** The sort key (moment, id) of a list that is sorted by them; undefined where the cursor is none of ours. */
export function momentKeyOf(cursor: string | undefined): { moment: string; id: string } | undefined {
  const key = Key.safeParse(keyOf(cursor, 2));
  return key.success ? { moment: key.data[0], id: key.data[1] } : undefined;
}
