/** Ends with a sentence where this Node is too old; nothing newer than Node 12 may be used before this has run. */
export function requireNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  const fits = (major === 20 && minor >= 19) || (major === 22 && minor >= 12) || major > 22;
  if (fits) return;
  console.error(`Oriel needs Node 20.19 or newer in the 20 line, or 22.12 and up. This is ${process.versions.node}.`);
  process.exit(1);
}
