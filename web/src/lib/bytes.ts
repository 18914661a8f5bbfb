/** "31.2 MB": decimal units as discs and mail programs count them; one decimal below 100, none for plain bytes. */
export { formatByteSize as formatBytes } from '../../../api/domain/byte-size.ts';

/** "about 6 min left", "about 40 s left", "about 2 h 10 min left"; nothing while it cannot be told. */
export function formatTimeLeft(seconds: number | null): string {
  if (seconds === null || !Number.isFinite(seconds) || seconds < 0) return '';
  if (seconds < 60) return `about ${Math.max(5, Math.ceil(seconds / 5) * 5)} s left`;
  const minutes = Math.round(seconds / 60);
  if (minutes < 60) return `about ${minutes} min left`;
  return `about ${Math.floor(minutes / 60)} h ${minutes % 60} min left`;
}
