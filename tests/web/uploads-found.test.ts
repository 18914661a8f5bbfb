import { describe, expect, it } from 'vitest';
import { takeDrop } from '../../web/src/lib/uploads/dropped-files.ts';
import { filesOfInput } from '../../web/src/lib/uploads/found-file.ts';
import { whyLeftOut } from '../../web/src/lib/uploads/junk.ts';

const fileHandle = (name: string) => ({ kind: 'file', name, getFile: () => Promise.resolve(new File(['x'], name)) });
const folderHandle = (name: string, children: { name: string }[]) => ({
  kind: 'directory',
  name,
  async *values() {
    for (const child of children) yield await Promise.resolve(child);
  },
});

/** An entry of the older interface, which hands a folder out in pieces. */
function folderEntry(fullPath: string, children: { fullPath: string }[]) {
  const pieces = [children.slice(0, 2), children.slice(2), []];
  return {
    isFile: false,
    fullPath,
    createReader: () => ({ readEntries: (done: (piece: unknown[]) => void) => done(pieces.shift() ?? []) }),
  };
}
const fileEntry = (fullPath: string) => ({
  isFile: true,
  fullPath,
  file: (done: (file: File) => void) => done(new File(['x'], fullPath.split('/').at(-1) ?? '')),
});

async function found(items: object[]): Promise<{ paths: string[]; groups: number; roots: (string | undefined)[] }> {
  const paths: string[] = [];
  const roots: (string | undefined)[] = [];
  let groups = 0;
  for await (const group of takeDrop({ items } as unknown as DataTransfer)) {
    groups += 1;
    for (const one of group) {
      paths.push(one.path);
      roots.push(one.root?.name);
    }
  }
  return { paths, groups, roots };
}

describe('what is dropped', () => {
  it('walks folders to the bottom through handles, which are kept for a later visit', async () => {
    const card = folderHandle('card', [fileHandle('a.jpg'), folderHandle('100', [fileHandle('b.jpg')])]);
    const items = [card, fileHandle('c.tif')].map((handle) => ({ kind: 'file', getAsFileSystemHandle: () => Promise.resolve(handle) }));
    expect(await found(items)).toEqual({ paths: ['card/a.jpg', 'card/100/b.jpg', 'c.tif'], groups: 1, roots: ['card', 'card', undefined] });
  });

  it('walks folders through entries, which hand them out in pieces', async () => {
    const files = ['1', '2', '3', '4'].map((name) => fileEntry(`/card/${name}.jpg`));
    const items = [{ kind: 'file', webkitGetAsEntry: () => folderEntry('/card', files) }];
    expect((await found(items)).paths).toEqual(['card/1.jpg', 'card/2.jpg', 'card/3.jpg', 'card/4.jpg']);
  });

  it('hands thousands out in groups, and passes over dragged words', async () => {
    const many = Array.from({ length: 450 }, (_, at) => fileHandle(`${at}.jpg`));
    const items = [{ kind: 'string' }, { kind: 'file', getAsFileSystemHandle: () => Promise.resolve(folderHandle('card', many)) }];
    const { paths, groups } = await found(items);
    expect([paths.length, groups]).toEqual([450, 3]);
  });

  it('takes plain files where the browser has nothing better', async () => {
    const items = [{ kind: 'file', webkitGetAsEntry: () => null, getAsFile: () => new File(['x'], 'plain.jpg') }];
    expect((await found(items)).paths).toEqual(['plain.jpg']);
  });

  it('takes the folders of a folder chooser along', () => {
    const file = Object.assign(new File(['x'], 'a.jpg'), { webkitRelativePath: 'card/100/a.jpg' });
    expect(filesOfInput([file, new File(['x'], 'b.jpg')]).map((one) => one.path)).toEqual(['card/100/a.jpg', 'b.jpg']);
  });
});

describe('what is left out', () => {
  it('are files of the system, companions and empty ones, and nothing that could be a picture', () => {
    for (const name of ['.DS_Store', '._HL_1.jpg', 'Thumbs.db', 'desktop.ini', 'HL_1.XMP']) expect(whyLeftOut(name, 10)).toBeDefined();
    expect(whyLeftOut('HL_1.jpg', 0)).toBe('The file is empty (0 bytes).');
    for (const name of ['HL_1.jpg', 'HL_1.dng', 'no-extension', 'HL_1.txt', 'grün.tif']) expect(whyLeftOut(name, 10)).toBeUndefined();
  });
});
