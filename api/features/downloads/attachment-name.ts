import contentDisposition from 'content-disposition';
import { cleanFileName } from '../../domain/file-names.ts';

/** For clients that do not know RFC 8187: letters without their accents, what is left beyond ASCII as an underscore. */
function plainName(name: string): string {
  return name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/[^\x20-\x7e]+/g, '_');
}

/**
 * Content-Disposition of a download (RFC 6266), in ASCII alone: the true name stands in filename* (RFC 8187). Line breaks
 * and marks that turn the reading direction are gone before the library sees the name: it would let the latter through.
 */
export function attachmentName(name: string): string {
  const clean = cleanFileName(name);
  return contentDisposition(clean, { type: 'attachment', fallback: plainName(clean) });
}
