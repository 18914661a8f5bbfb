const UNITS = ['B', 'kB', 'MB', 'GB', 'TB'];

/** "31.2 MB": decimal units as discs and mail programs count them; one decimal below 100, none for plain bytes. */
export function formatByteSize(bytes: number): string {
  let value = bytes;
  let unit = 0;
  while (value >= 999.5 && unit < UNITS.length - 1) {
    value /= 1000;
    unit += 1;
  }
  const digits = unit > 0 && value < 99.95 ? 1 : 0;
  return `${value.toFixed(digits)} ${UNITS[unit]}`;
}
