const SYSTEM_FILES = new Set(['thumbs.db', 'ehthumbs.db', 'desktop.ini', 'icon\r']);
const SIDECARS = new Set(['xmp', 'thm', 'ctg', 'lrv']);

/**
 * Says why a file is left out before anything is read of it, or undefined where it is worth sending. What a file really
 * is, the server judges by its content: here only what can never be a picture is named.
 */
export function whyLeftOut(name: string, size: number): string | undefined {
  if (name.startsWith('.') || SYSTEM_FILES.has(name.toLowerCase())) {
    return 'A file of the operating system, not a picture.';
  }
  if (SIDECARS.has(extension(name))) return 'A companion file of a camera or raw converter, not a picture.';
  if (size === 0) return 'The file is empty (0 bytes).';
  return undefined;
}

function extension(name: string): string {
  const dot = name.lastIndexOf('.');
  return dot === -1 ? '' : name.slice(dot + 1).toLowerCase();
}
