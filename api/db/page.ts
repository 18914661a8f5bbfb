/** One page of a list, and the cursor of the next one; null on the last page. */
export interface Page<T> {
  items: T[];
  next: string | null;
}

/** Makes the opaque cursor that stands for the sort key of a row. */
export function cursorOf(key: readonly (string | number | null)[]): string {
  return Buffer.from(JSON.stringify(key)).toString('base64url');
}

/** Reads a cursor back into its sort key of `length` parts; undefined where it is none of ours. */
export function keyOf(cursor: string | undefined, length: number): (string | number | null)[] | undefined {
  if (!cursor) return undefined;
  try {
    const key: unknown = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
    const fits =
      Array.isArray(key) && key.length === length && key.every((part) => part === null || ['string', 'number'].includes(typeof part));
    return fits ? (key as (string | number | null)[]) : undefined;
  } catch {
    return undefined;
  }
}

/** Cuts a page out of `limit + 1` rows: the row beyond the limit tells that there is a next page. */
export function pageOf<Row>(rows: Row[], limit: number, key: (row: Row) => readonly (string | number | null)[]): Page<Row> {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  return { items, next: rows.length > limit && last ? cursorOf(key(last)) : null };
}
