import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Findings } from '../../scripts/look/findings.ts';
import { readTags } from '../support/exiftool.ts';
import { exposeFile } from '../support/exposed.ts';

const folder = mkdtempSync(path.join(tmpdir(), 'oriel-look-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

interface Ended {
  code: number | null;
  out: string;
  errors: string;
}

/** Runs the command as `npm run look` does, without a database, a store or any setting. */
function look(...words: string[]): Promise<Ended> {
  const bare = { PATH: process.env.PATH, HOME: process.env.HOME };
  const child = spawn(process.execPath, ['--import', 'tsx', 'scripts/look.ts', ...words], { env: bare, stdio: ['ignore', 'pipe', 'pipe'] });
  const ended: Ended = { code: null, out: '', errors: '' };
  child.stdout.on('data', (chunk: Buffer) => (ended.out += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (ended.errors += chunk.toString()));
  return new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (code) => resolve({ ...ended, code }));
  });
}

const inCard = (name: string) => path.join(folder, 'card', name);
const bracket = ['HL_0413.jpg', 'HL_0412.jpg', 'HL_0414.jpg'].map(inCard);
const single = inCard('HL_0420.jpg');
const broken = path.join(folder, 'broken.jpg');

beforeAll(async () => {
  const card = path.join(folder, 'card');
  mkdirSync(card);
  const exposures: [string, number, number][] = [
    ['HL_0412.jpg', 1 / 60, 0],
    ['HL_0413.jpg', 1 / 250, -2],
    ['HL_0414.jpg', 1 / 15, 2],
  ];
  for (const [index, [name, seconds, stops]] of exposures.entries()) {
    await exposeFile(card, { name, seconds, stops: stops / 2, taken: `2026:10:28 17:06:1${index}`, subSeconds: '34' });
  }
  const tags = ['-ExifIFD:OffsetTimeOriginal=+01:00'];
  await exposeFile(card, { name: 'HL_0420.jpg', seconds: 2.5, stops: 0, taken: '2026:10:28 18:00:00', view: 5, tags });
  writeFileSync(path.join(card, 'notes.txt'), 'not a picture');
  writeFileSync(broken, (await sharp(single).jpeg().toBuffer()).subarray(0, 9000));
});

describe('npm run look', () => {
  it('answers in JSON for a folder: settings, exposure value, brackets with their reason', async () => {
    const { code, out, errors } = await look('--json', path.join(folder, 'card'));
    expect({ code, errors }).toEqual({ code: 0, errors: '' });
    const findings = JSON.parse(out) as Findings;
    expect(Object.keys(findings)).toEqual(['files', 'brackets']);
    expect(findings.files.map(({ file }) => file)).toEqual([...bracket].sort().concat(single));
    expect(findings.brackets).toEqual([{ files: bracket, lead: bracket[1], says: '3 frames, 2 stops apart, f/11, ISO 100' }]);
    const last = findings.files[3];
    expect(last?.settings).toMatchObject({ fNumber: 11, exposureTime: 2.5, iso: 100, focalLength: 24, focalLength35: 24 });
    expect(last?.settings.takenAt).toBe('2026-10-28T18:00:00+01:00');
    expect(findings.files[0]?.settings.takenAt).toBe('2026-10-28T17:06:10.34');
    // ExifTool's LightValue is the exposure value at ISO 100.
    for (const { file, ev100 } of findings.files) {
      const { 'Composite:LightValue': lightValue } = await readTags(file, '-Composite:LightValue');
      expect(ev100).toBeCloseTo(lightValue as number, 3);
    }
    // 320 pixels across 210 mm are 38.7 ppi; 320 pixels at 300 ppi are 27 mm, and 297 / 210 times as much is 38 mm.
    expect(last?.uses.find(({ use }) => use === 'a4-page')).toMatchObject({ sharp: false, says: '38 ppi, sharp up to 3.8 × 2.7 cm' });
    for (const { checks } of findings.files)
      for (const { check, says } of checks) expect([typeof check, says.length > 9]).toEqual(['string', true]);
  });

  it('names near-doubles, and never the frames of one bracket as such', async () => {
    const double = path.join(folder, 'double');
    mkdirSync(double);
    const twin = await exposeFile(double, { name: 'HL_0421.jpg', seconds: 2.5, stops: 0, taken: '2026:10:28 18:01:00', view: 5 });
    const { out } = await look('--json', ...bracket, single, twin);
    const { files } = JSON.parse(out) as Findings;
    const alike = files.map(({ checks }) => checks.find(({ check }) => check === 'alike')?.says ?? null);
    expect(alike.slice(0, 3)).toEqual([null, null, null]);
    expect(alike[3]).toContain('It looks nearly like HL_0421.jpg.');
    expect(alike[4]).toContain('It looks nearly like HL_0420.jpg.');
  });

  it('says the same in words', async () => {
    const { code, out } = await look(...bracket, single);
    expect(code).toBe(0);
    expect(out).toContain('f/11 · 2.5 s · ISO 100 · 24 mm, 2026-10-28 18:00:00+01:00');
    expect(out).toContain('Bracket: 3 frames, 2 stops apart, f/11, ISO 100\n  HL_0413.jpg, HL_0412.jpg, HL_0414.jpg; lead HL_0412.jpg');
    expect(out.trimEnd().endsWith('4 files: 1 bracket, 1 single frame')).toBe(true);
  });

  it('answers the good files beside bad ones, with a sentence for each bad one and exit code 1', async () => {
    const missing = path.join(folder, 'HL_9999.jpg');
    const text = path.join(folder, 'card', 'notes.txt');
    const { code, out, errors } = await look('--json', broken, single, missing, text);
    expect(code).toBe(1);
    const findings = JSON.parse(out) as Findings;
    expect(findings.files.map(({ file }) => file)).toEqual([single]);
    const says = new Map(findings.problems?.map((problem) => [problem.file, problem.says]));
    expect([...says.keys()].sort()).toEqual([broken, missing, text].sort());
    expect(says.get(missing)).toBe('There is no such file.');
    expect(says.get(broken)).toMatch(/cut short or damaged/);
    for (const [file, sentence] of says) expect(errors).toContain(`${file}: ${sentence}\n`);
    expect(errors).not.toMatch(/\n\s+at /);
  });

  it('asks for files where none are named, and names an empty folder', async () => {
    const nothing = await look('--json');
    expect(nothing.code).toBe(1);
    expect(JSON.parse(nothing.out)).toMatchObject({
      files: [],
      brackets: [],
      problems: [{ says: expect.stringContaining('Name the files') as string }],
    });
    const empty = path.join(folder, 'empty');
    mkdirSync(empty);
    expect(await look(empty)).toEqual({ code: 1, out: '', errors: `${empty}: There are no pictures in this folder.\n` });
  });

  it('explains itself, and refuses options it does not have', async () => {
    const help = await look('--help');
    expect(help).toMatchObject({ code: 0, errors: '' });
    expect(help.out).toContain('npm run look -- FILES… [--json] [--merge DIR]');
    expect(await look('--fast', single)).toMatchObject({ code: 1, out: '', errors: expect.stringContaining('--fast') as string });
  });

  it('writes the merged picture of each bracket as PNG', async () => {
    const into = path.join(folder, 'merged', 'today');
    const { code, out } = await look('--json', '--merge', into, ...bracket, single);
    expect(code).toBe(0);
    expect(readdirSync(into)).toEqual(['HL_0412-merged.png']);
    const file = path.join(into, 'HL_0412-merged.png');
    const findings = JSON.parse(out) as Findings;
    expect(findings.brackets[0]?.merged).toEqual({ file, says: '3 exposures merged' });
    const { format, width, height } = await sharp(file).metadata();
    expect({ format, width, height }).toEqual({ format: 'png', width: 480, height: 320 });
    // A fused picture lies between its darkest and its brightest exposure.
    const mean = async (source: string) => (await sharp(source).greyscale().stats()).channels[0]?.mean as number;
    const [dark, merged, bright] = [await mean(bracket[0] as string), await mean(file), await mean(bracket[2] as string)];
    expect(merged).toBeGreaterThan(dark + 5);
    expect(merged).toBeLessThan(bright - 5);
  });

  it('says so where the folder for merged pictures cannot be made', async () => {
    const { code, errors } = await look('--merge', path.join(single, 'below'), ...bracket);
    expect(code).toBe(1);
    expect(errors).toContain('This folder cannot be made, so nothing is merged.');
    expect(existsSync(path.join(single, 'below'))).toBe(false);
  });
});
