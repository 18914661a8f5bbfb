import { describe, expect, it } from 'vitest';
import { zipLength } from '../../api/domain/zip-layout.ts';

const GIB = 2 ** 30;
const numbered = (count: number) => Array.from({ length: count }, (_, i) => ({ name: String(i).padStart(5, '0'), size: 0 }));

// Recomputed with Python 3 zipfile on an unseekable stream; each archive accepted by unzip 6.0, 7zz 26.02, bsdtar 3.6.2 and zipfile.
describe('length of a stored archive, streamed with descriptors (APPNOTE 6.3.10 §4.3)', () => {
  const three = [
    { name: 'a.txt', size: 9 },
    { name: 'dir/b.bin', size: 1000 },
    { name: 'ß/ü.jpg', size: 12345 },
  ];

  it('of three files', () => {
    expect(zipLength(three)).toBe(13698);
    expect(zipLength(three, { style: 'local-extra' })).toBe(13698);
  });

  it('of three files without descriptors', () => {
    expect(zipLength(three, { buffered: () => true })).toBe(13650);
  });

  it('of two files, one with a name beyond ASCII', () => {
    expect(
      zipLength([
        { name: 'a.txt', size: 9 },
        { name: 'ü/ß.jpg', size: 1000 },
      ]),
    ).toBe(1243);
  });

  it('of nothing is the end record alone (§4.3.16)', () => {
    expect(zipLength([])).toBe(22);
  });

  it('of as many entries as fit without ZIP64, and one more (without descriptors)', () => {
    const options = { style: 'local-extra', buffered: () => true } as const;
    expect(zipLength(numbered(65534), options)).toBe(5635946);
    expect(zipLength(numbered(65535), options)).toBe(5635946 + 86 + 76);
  });

  it('of as many entries as fit without ZIP64, and one more', () => {
    expect(zipLength(numbered(65534), { style: 'local-extra' })).toBe(6684490);
    expect(zipLength(numbered(65535), { style: 'local-extra' })).toBe(6684668);
  });

  it('of a file beyond 4 GiB and one behind it', () => {
    const entries = [
      { name: 'big.bin', size: 4 * GIB + 1 },
      { name: 'after.txt', size: 3 },
    ];
    expect(zipLength(entries, { style: 'local-extra' })).toBe(4294967674);
    // npm archiver 8: no local extra (−20), three fields in both central records (+8 and +16).
    expect(zipLength(entries)).toBe(4294967674 - 20 + 8 + 16);
  });
});
