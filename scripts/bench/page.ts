import { type Browser, chromium, type Page } from 'playwright-core';
import { makeBenchGuest, makeBigSheet } from './big-sheet.ts';
import { buildWeb, webIsStale } from '../start/build-web.ts';
import { startBenchHouse } from './bench-house.ts';
import { type Figure, figure, median } from './figures.ts';

const PROOFS = 1000;
const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

interface Seen {
  firstRow: number;
  /** Longest task of the page's main thread: by its own processor time, and by the clock on the wall. */
  longest: number;
  longestByTheClock: number;
  shift: number;
  script: number;
}

interface TraceEvent {
  name: string;
  pid: number;
  tid: number;
  /** Microseconds by the clock, and of processor time. */
  dur?: number;
  tdur?: number;
  args: { name?: string };
}

/**
 * The longest task of a page in a trace, in ms. By its own processor time: this browser rasters in software, and on two cores the page's
 * thread waits for that, for the other processes and for the trace itself, which the clock on the wall counts too.
 */
function longestTask(trace: Buffer): { own: number; clock: number } {
  const { traceEvents } = JSON.parse(trace.toString()) as { traceEvents: TraceEvent[] };
  const threads = traceEvents.filter((event) => event.name === 'thread_name' && event.args.name === 'CrRendererMain');
  const main = new Set(threads.map(({ pid, tid }) => `${pid}/${tid}`));
  const tasks = traceEvents.filter(({ name, pid, tid }) => name.endsWith('RunTask') && main.has(`${pid}/${tid}`));
  if (tasks.length === 0) throw new Error('The trace names no task of the page.');
  const most = (of: 'dur' | 'tdur') => tasks.reduce((longest, task) => Math.max(longest, task[of] ?? 0), 0) / 1000;
  return { own: most('tdur'), clock: most('dur') };
}

/** A flick that does not end: a notch of the wheel, 120 px, in each frame, through so many notches. */
const NOTCHES = 500;

async function scrollThrough(browser: Browser, tab: Page): Promise<{ own: number; clock: number }> {
  await tab.mouse.move(700, 450);
  await tab.waitForTimeout(500);
  await browser.startTracing(tab, { categories: ['toplevel'] });
  for (let notch = 0; notch < NOTCHES; notch += 1) {
    await tab.mouse.wheel(0, 120);
    await tab.waitForTimeout(16);
  }
  return longestTask(await browser.stopTracing());
}

/** Runs in the page before its own code: notes shifts, and when the first row of pictures is drawn. */
function watch(): void {
  const notes = { shift: 0, json: 0, firstRow: 0 };
  Object.assign(window, { benchNotes: notes });
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) notes.shift += (entry as PerformanceEntry & { value: number; hadRecentInput: boolean }).value;
  }).observe({ type: 'layout-shift', buffered: true });
  const look = () => {
    const answered = performance.getEntriesByType('resource').find((entry) => entry.name.endsWith('/proofs'));
    if (answered) notes.json = (answered as PerformanceResourceTiming).responseEnd;
    const pictures = [...document.querySelectorAll<HTMLImageElement>('figure img')].slice(0, 2);
    if (notes.json > 0 && pictures.length === 2 && pictures.every((picture) => picture.complete && picture.naturalWidth > 0))
      notes.firstRow = performance.now();
    else requestAnimationFrame(look);
  };
  requestAnimationFrame(look);
}

/** A guest's sheet of 1,000 proofs in Chromium: first row after the JSON, longest task while scrolling through all of it, layout shift, bytes of script. */
export async function page(rounds: number): Promise<Figure[]> {
  const house = await startBenchHouse();
  const { webRoot } = house.ctx.config;
  if (webIsStale(webRoot)) await buildWeb(webRoot);
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: FLAGS });
  try {
    const { sheet } = await makeBigSheet(house, PROOFS, true);
    const guest = await makeBenchGuest(house, sheet, 0);
    const [name = '', value = ''] = guest.cookie.split('=');
    const seen: Seen[] = [];
    for (let at = 0; at < rounds; at += 1) {
      const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
      await context.addCookies([{ name, value, url: house.address }]);
      const tab = await context.newPage();
      let script = 0;
      tab.on('response', (answer) => {
        if (!answer.url().endsWith('.js')) return;
        void answer
          .request()
          .sizes()
          .then((sizes) => (script += sizes.responseBodySize))
          .catch(() => undefined);
      });
      // The loader of TypeScript names functions by a helper that the page does not have.
      await tab.addInitScript('globalThis.__name = (named) => named;');
      await tab.addInitScript(watch);
      await tab.goto(`${house.address}/sheets/${sheet.id}`);
      await tab.waitForFunction(() => (window as unknown as { benchNotes: { firstRow: number } }).benchNotes.firstRow > 0);
      const longest = await scrollThrough(browser, tab);
      const notes = await tab.evaluate(
        () => (window as unknown as { benchNotes: { firstRow: number; json: number; shift: number } }).benchNotes,
      );
      const { own, clock } = longest;
      seen.push({ firstRow: notes.firstRow - notes.json, longest: own, longestByTheClock: clock, shift: notes.shift, script });
      process.stderr.write(`round ${at + 1} of ${rounds}: ${JSON.stringify(seen.at(-1))}\n`);
      await context.close();
    }
    const of = (key: keyof Seen) => median(seen.map((each) => each[key]));
    return [
      figure(`first row of ${PROOFS} proofs after the JSON (limit 1000)`, 'ms', of('firstRow'), 1000),
      figure('longest task while scrolling, processor time (limit 50)', 'ms', of('longest'), 50),
      figure('the same by the clock', 'ms', of('longestByTheClock'), null),
      figure('layout shift (limit 0.01)', '', of('shift'), 0.01),
      figure('script, compressed (limit 150)', 'kB', of('script') / 1000, 150),
    ];
  } finally {
    await browser.close();
    await house.stop();
  }
}
