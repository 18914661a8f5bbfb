import { thumbHashToDataURL } from 'thumbhash';

const KEPT = 2_000;
const addresses = new Map<string, string>();

/**
 * The address of the blurred placeholder for a thumbhash in base64 (about 28 characters); undefined where it cannot be
 * read. The last 2,000 are kept, because a row that scrolls back in asks again.
 */
export function thumbhashAddress(hash: string | null | undefined): string | undefined {
  if (!hash) return undefined;
  const known = addresses.get(hash);
  if (known) return known;
  try {
    const bytes = Uint8Array.from(atob(hash), (letter) => letter.charCodeAt(0));
    const address = thumbHashToDataURL(bytes);
    if (addresses.size >= KEPT) addresses.delete(addresses.keys().next().value ?? '');
    addresses.set(hash, address);
    return address;
  } catch {
    return undefined;
  }
}
