/** A pattern for ILIKE that finds what a person typed anywhere in a text; %, _ and \ mean themselves. */
export function containing(typed: string): string {
  return `%${typed.replace(/[\\%_]/g, '\\$&')}%`;
}
