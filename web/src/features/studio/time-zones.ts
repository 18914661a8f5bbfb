/** The zones the browser knows, and one more that a studio may have from elsewhere. */
export function timeZones(present: string): string[] {
  return [...new Set(['UTC', present, ...Intl.supportedValuesOf('timeZone')])].sort();
}
