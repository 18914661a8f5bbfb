/** One line of a list of checksums. `sha256` is 64 hexadecimal digits, `name` is relative to the list's folder. */
export interface ManifestLine {
  sha256: string;
  name: string;
}

/**
 * A list in the form `sha256sum -c` reads (GNU coreutils): 64 digits, two spaces, name. A name with a backslash, newline
 * or carriage return is escaped and its line begins with a backslash, as coreutils writes it.
 */
export function sha256Manifest(lines: readonly ManifestLine[]): string {
  return lines.map(manifestLine).join('');
}

function manifestLine({ sha256, name }: ManifestLine): string {
  if (!/^[0-9a-f]{64}$/.test(sha256)) throw new RangeError(`"${sha256}" is no SHA-256 in lower-case hexadecimal digits.`);
  const escaped = name.replace(/\\/g, '\\\\').replace(/\n/g, '\\n').replace(/\r/g, '\\r');
  return `${escaped === name ? '' : '\\'}${sha256}  ${escaped}\n`;
}
