import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { byteLength, cleanFileName, cutToBytes, distinctNames, splitExtension } from '../../api/domain/file-names.ts';

describe('a clean file name', () => {
  it.each([
    ['IMG_0412.jpg', 'IMG_0412.jpg'],
    ['grün – Straße.tif', 'grün – Straße.tif'],
    ['日本.jpg', '日本.jpg'],
    ['u\u0308ber.jpg', 'über.jpg'],
    ['../../etc/passwd', 'passwd'],
    ['C:\\Users\\me\\a.jpg', 'a.jpg'],
    ['/abs.txt', 'abs.txt'],
    ['a/../../evil.txt', 'evil.txt'],
    ['..', 'file'],
    ['.', 'file'],
    ['', 'file'],
    ['folder/', 'file'],
    ['a\u0000b\r\nc.jpg', 'abc.jpg'],
    ['photo\u202egpj.exe', 'photogpj.exe'],
    ['what?<is>*this|.jpg', 'what__is__this_.jpg'],
    ['a:b.jpg', 'a_b.jpg'],
    [' . name.jpg. . ', 'name.jpg'],
    ['CON', '_CON'],
    ['nul.jpg', '_nul.jpg'],
    ['COM1.tar.gz', '_COM1.tar.gz'],
    ['lpt9', '_lpt9'],
    ['console.jpg', 'console.jpg'],
    ['a\ud800b.jpg', 'ab.jpg'],
  ])('of %j is %j', (name, clean) => {
    expect(cleanFileName(name)).toBe(clean);
  });

  it('is cut to 255 bytes with its extension kept and no character split', () => {
    const name = cleanFileName(`${'é'.repeat(300)}.jpeg`);
    expect(byteLength(name)).toBeLessThanOrEqual(255);
    expect(name).toMatch(/^é+\.jpeg$/);
    expect(cutToBytes('👩‍👩‍👧‍👦x', 10)).toBe('');
  });

  it('is, whatever comes, one harmless part of a path, and clean already when cleaned again', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 400 }), (name) => {
        const clean = cleanFileName(name);
        expect(clean).not.toBe('');
        expect(clean).not.toMatch(/[/\\<>:"|?*\p{Cc}\u202a-\u202e\u2066-\u2069]/u);
        expect(clean).not.toMatch(/^[. ]|[. ]$/);
        expect(clean).toBe(clean.normalize('NFC'));
        expect(byteLength(clean)).toBeLessThanOrEqual(255);
        expect(cleanFileName(clean)).toBe(clean);
      }),
      { numRuns: 1000 },
    );
  });
});

describe('the extension', () => {
  it.each([
    ['a.b.tif', 'a.b', '.tif'],
    ['name', 'name', ''],
    ['.profile', '.profile', ''],
    ['name.', 'name.', ''],
    ['a.this-is-no-extension', 'a.this-is-no-extension', ''],
  ])('of %s', (name, stem, extension) => {
    expect(splitExtension(name)).toEqual([stem, extension]);
  });
});

describe('distinct names', () => {
  it('number the later ones, ignoring case', () => {
    expect(distinctNames(['a.jpg', 'A.JPG', 'a.jpg', 'b.jpg'])).toEqual(['a.jpg', 'A (2).JPG', 'a (3).jpg', 'b.jpg']);
  });

  it('pass over a number that somebody bears already', () => {
    expect(distinctNames(['a.jpg', 'a.jpg', 'a (2).jpg'])).toEqual(['a.jpg', 'a (3).jpg', 'a (2).jpg']);
  });

  it('avoid names that are taken', () => {
    expect(distinctNames(['SHA256SUMS'], ['sha256sums'])).toEqual(['SHA256SUMS (2)']);
  });

  it('stay within 255 bytes', () => {
    const long = `${'x'.repeat(251)}.jpg`;
    const [first, second] = distinctNames([long, long]);
    expect(first).toBe(long);
    expect(byteLength(second ?? '')).toBe(255);
    expect(second).toMatch(/x \(2\)\.jpg$/);
  });

  it('are distinct, keep the first of each name and the order, for any list', () => {
    const name = fc.constantFrom('a.jpg', 'A.jpg', 'a (2).jpg', 'a (3).JPG', 'ä.jpg', 'a\u0308.jpg', 'ß.jpg', 'SS.jpg', 'b');
    fc.assert(
      fc.property(fc.array(name, { maxLength: 30 }), (names) => {
        const distinct = distinctNames(names);
        expect(distinct).toHaveLength(names.length);
        expect(new Set(distinct.map((one) => one.normalize('NFC').toLowerCase())).size).toBe(names.length);
        if (names.length > 0) expect(distinct[0]).toBe(names[0]);
      }),
    );
  });
});
