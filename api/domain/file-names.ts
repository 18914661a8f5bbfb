/** A part of a path may have so many bytes of UTF-8 on the file systems people unpack to (ext4, APFS; NTFS has 255 units). */
export const MAX_NAME_BYTES = 255;

const LONE_SURROGATES = /\p{Surrogate}/gu;
const CONTROLS = /[\p{Cc}\u2028\u2029]/gu;
/** Marks that turn the reading direction (Unicode UAX #9) and invisible joiners: "gpj.exe" can be made to read as ".jpg". */
const BIDI_AND_INVISIBLE = /[\u061c\u200b-\u200f\u202a-\u202e\u2060-\u2064\u2066-\u206f\ufeff\ufff9-\ufffb]/g;
/** Characters that Windows refuses in names (Microsoft, "Naming Files, Paths, and Namespaces"). */
const REFUSED_ON_WINDOWS = /[<>:"|?*]/g;
const DEVICE = /^(con|prn|aux|nul|conin\$|conout\$|com[0-9¹²³]|lpt[0-9¹²³])(?=\.|$)/i;

const utf8 = new TextEncoder();

/** Length in bytes of UTF-8. */
export function byteLength(text: string): number {
  return utf8.encode(text).length;
}

/** Name and extension: "a.b.tif" is ["a.b", ".tif"]; ".profile" and "name" have no extension. Longer than 11 is none. */
export function splitExtension(name: string): [stem: string, extension: string] {
  const dot = name.lastIndexOf('.');
  const isExtension = dot > 0 && dot < name.length - 1 && name.length - dot <= 11;
  return isExtension ? [name.slice(0, dot), name.slice(dot)] : [name, ''];
}

/** Cuts text to so many bytes without splitting a character or leaving a combining mark's base behind. */
export function cutToBytes(text: string, limit: number): string {
  if (byteLength(text) <= limit) return text;
  const parts = new Intl.Segmenter('en', { granularity: 'grapheme' }).segment(text);
  let cut = '';
  let used = 0;
  for (const { segment } of parts) {
    used += byteLength(segment);
    if (used > limit) break;
    cut += segment;
  }
  return cut;
}

function fit(stem: string, extension: string, limit = MAX_NAME_BYTES): string {
  return cutToBytes(stem, limit - byteLength(extension)) + extension;
}

/**
 * A name that is safe as one part of a path everywhere: the last part of what came, in NFC, without control characters,
 * direction marks or characters a file system refuses, no leading or trailing dots or spaces, no Windows device name, at
 * most 255 bytes with its extension kept. Never empty: `fallback` stands where nothing is left.
 */
export function cleanFileName(name: string, fallback = 'file'): string {
  const last = name.replace(LONE_SURROGATES, '').normalize('NFC').split(/[/\\]/).pop() ?? '';
  const plain = last
    .replace(CONTROLS, '')
    .replace(BIDI_AND_INVISIBLE, '')
    .replace(REFUSED_ON_WINDOWS, '_')
    .replace(/\s+/g, ' ')
    .replace(/^[. ]+|[. ]+$/g, '');
  if (plain === '') return fallback;
  const harmless = DEVICE.test(plain) ? `_${plain}` : plain;
  // Cutting can bare a dot or a space at the end of the stem again.
  const [stem, extension] = splitExtension(harmless);
  return fit(stem, extension).replace(/[. ]+$/, '') || fallback;
}

/** What two names are compared by: file systems that ignore case would let one overwrite the other. */
function folded(name: string): string {
  return name.normalize('NFC').toLowerCase().toUpperCase().toLowerCase();
}

/**
 * The same names in the same order, made distinct ignoring case: the first keeps its name, later ones become "a (2).jpg",
 * "a (3).jpg"; a number that somebody's own name already bears is passed over. `taken` names are avoided too.
 */
export function distinctNames(names: readonly string[], taken: readonly string[] = []): string[] {
  const originals = new Set(names.map(folded));
  const used = new Set(taken.map(folded));
  const next = new Map<string, number>();
  return names.map((name) => {
    const key = folded(name);
    let candidate = name;
    if (used.has(key)) {
      const [stem, extension] = splitExtension(name);
      let number = next.get(key) ?? 2;
      do {
        const ending = ` (${number++})${extension}`;
        candidate = fit(stem, ending);
      } while (used.has(folded(candidate)) || originals.has(folded(candidate)));
      next.set(key, number);
    }
    used.add(folded(candidate));
    return candidate;
  });
}
