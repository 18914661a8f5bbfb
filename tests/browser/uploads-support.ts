import { mkdtempSync, rmSync } from 'node:fs';
import { writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Page, Request } from 'playwright-core';
import sharp from 'sharp';
import type { House } from '../support/house.ts';

/** A folder of files that a photographer brings; gone with `remove`. */
export function startCard() {
  const dir = mkdtempSync(path.join(tmpdir(), 'oriel-card-'));
  let seed = 0;
  return {
    dir,
    async jpeg(name: string, width = 900, height = 600): Promise<string> {
      seed += 1;
      const background = { r: (seed * 53) % 200, g: (seed * 97) % 200, b: (seed * 31) % 200 };
      const picture = await sharp({ create: { width, height, channels: 3, background } })
        .jpeg()
        .toBuffer();
      return this.file(name, picture);
    },
    /** An uncompressed picture of 17 MB: three parts. */
    async largeTiff(name: string): Promise<string> {
      seed += 1;
      const picture = sharp({ create: { width: 2400, height: 2400, channels: 3, background: { r: 90 + seed, g: 80, b: 70 } } });
      return this.file(name, await picture.tiff({ compression: 'none' }).toBuffer());
    },
    async file(name: string, content: Buffer | string): Promise<string> {
      const place = path.join(dir, name);
      await writeFile(place, content);
      return place;
    },
    remove: () => rmSync(dir, { recursive: true, force: true }),
  };
}

/** Runs the house's jobs again and again, as the worker does, until it is stopped. */
export function keepWorking(house: House): { stop(): Promise<void> } {
  let on = true;
  const work = (async () => {
    while (on) {
      await house.runJobs();
      await new Promise((resolve) => setTimeout(resolve, 150));
    }
  })();
  return {
    stop: async () => {
      on = false;
      await work;
    },
  };
}

/** Hands files to the chooser of the upload panel. */
export async function chooseFiles(page: Page, files: string[]): Promise<void> {
  await page.locator('input[data-chooser=files]').setInputFiles(files);
}

/** Notes the numbers of the parts that the page sends from now on. */
export function notePart(page: Page): number[] {
  const parts: number[] = [];
  page.on('request', (request: Request) => {
    const number = /\/parts\/(\d+)$/.exec(request.url())?.[1];
    if (number && request.method() === 'PUT') parts.push(Number(number));
  });
  return parts;
}

/**
 * Keeps the parts that `which` names waiting between the server and its store. (To hold them back in the browser would
 * send every byte through the test as well.)
 */
export function holdParts({ ctx }: House, which: (number: number) => boolean) {
  const store = ctx.store;
  const upload = store.uploadPart.bind(store);
  const held: { release: () => void; lose: () => void }[] = [];
  store.uploadPart = async (key, multipartId, number, part) => {
    if (which(number)) {
      await new Promise<void>((resolve, reject) => held.push({ release: resolve, lose: () => reject(new Error('Lost by the test.')) }));
    }
    return upload(key, multipartId, number, part);
  };
  const end = (how: 'release' | 'lose') => {
    store.uploadPart = upload;
    for (const one of held) one[how]();
  };
  return { held, release: () => end('release'), lose: () => end('lose') };
}
