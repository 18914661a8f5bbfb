import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { chromium, type BrowserContext, type BrowserContextOptions, type Page } from 'playwright-core';
import { expect, inject } from 'vitest';
import { startHouse, type House, type HouseOptions } from '../support/house.ts';

const CHROMIUM = process.env.ORIEL_CHROMIUM ?? '/usr/bin/chromium';
const FLAGS = [
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];
const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** The three screens every guest page is looked at on. */
export const SCREENS = {
  phone: { viewport: { width: 390, height: 844 }, hasTouch: true, isMobile: true, deviceScaleFactor: 2 },
  tablet: { viewport: { width: 768, height: 1024 }, hasTouch: true, deviceScaleFactor: 1 },
  desktop: { viewport: { width: 1440, height: 900 }, deviceScaleFactor: 1 },
} satisfies Record<string, BrowserContextOptions>;

/** One person at one browser: a cookie jar, a page, and the ear for what the console says. */
export interface Visitor {
  page: Page;
  context: BrowserContext;
  /** What the console called an error so far, and errors nobody caught. */
  consoleErrors: string[];
  /** Errors that match are part of the test: a refused request is one for Chromium. */
  expectErrors(pattern: RegExp): void;
  /** Fails where axe finds a violation of WCAG 2.0 to 2.2, A or AA, target sizes among them. */
  audit(): Promise<void>;
  /** Closes the browser's window and fails where the console had an error that was not expected. */
  close(): Promise<void>;
}

export interface Site {
  house: House;
  visit(path: string, options?: BrowserContextOptions & { cookie?: string | string[] }): Promise<Visitor>;
  stop(): Promise<void>;
}

/**
 * The whole product with its built pages, and a Chromium to look at it. `cookie` takes the Set-Cookie lines of an answer,
 * so a session that was begun through the API goes on in the browser.
 */
export async function startSite(options: HouseOptions = {}): Promise<Site> {
  const house = await startHouse({ ...options, env: { ORIEL_WEB_ROOT: inject('webRoot'), ...options.env } });
  const profile = mkdtempSync(path.join(tmpdir(), 'oriel-chromium-'));
  const browser = await chromium.launch({
    executablePath: CHROMIUM,
    args: [...FLAGS, `--crash-dumps-dir=${profile}`],
    chromiumSandbox: false,
  });
  const visitors = new Set<Visitor>();

  return {
    house,
    async visit(address, { cookie, ...screen } = {}) {
      const context = await browser.newContext({ ...SCREENS.desktop, locale: 'en-GB', timezoneId: 'Europe/London', ...screen });
      const cookies = [cookie ?? []].flat().map((line) => cookieOf(line, house.address));
      if (cookies.length > 0) await context.addCookies(cookies);
      const visitor = await meet(context, () => visitors.delete(visitor));
      visitors.add(visitor);
      await visitor.page.goto(house.address + address);
      return visitor;
    },
    async stop() {
      const left = [...visitors];
      const ends = await Promise.allSettled(left.map((visitor) => visitor.close()));
      await browser.close();
      await house.stop();
      rmSync(profile, { recursive: true, force: true });
      const failed = ends.find((end) => end.status === 'rejected');
      if (failed) throw failed.reason;
    },
  };
}

function cookieOf(line: string, url: string): { name: string; value: string; url: string } {
  const [pair = ''] = line.split(';');
  const at = pair.indexOf('=');
  return { name: pair.slice(0, at), value: pair.slice(at + 1), url };
}

async function meet(context: BrowserContext, left: () => void): Promise<Visitor> {
  const page = await context.newPage();
  const consoleErrors: string[] = [];
  const expected: RegExp[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') consoleErrors.push(`${message.text()} ${message.location().url}`.trim());
  });
  page.on('pageerror', (error) => consoleErrors.push(`not caught: ${error.message}`));
  return {
    page,
    context,
    consoleErrors,
    expectErrors: (pattern) => void expected.push(pattern),
    audit: () => audit(page),
    async close() {
      left();
      await context.close();
      const surprises = consoleErrors.filter((line) => !expected.some((pattern) => pattern.test(line)));
      expect(surprises, 'errors in the console').toEqual([]);
    },
  };
}

interface AxeResult {
  violations: { id: string; help: string; nodes: { target: string[]; failureSummary?: string }[] }[];
}

/** axe's rules for WCAG 2.0 to 2.2, A and AA; target-size is off by default (axe-core 4.14.1) and switched on here. */
async function audit(page: Page): Promise<void> {
  await page.evaluate(axeSource);
  const result = await page.evaluate<AxeResult>(`axe.run(document, {
    resultTypes: ['violations'],
    runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'] },
    rules: { 'target-size': { enabled: true } },
  })`);
  const found = result.violations.flatMap(({ id, help, nodes }) =>
    nodes.map((node) => `${id}: ${help} at ${node.target.join(' ')} ${node.failureSummary ?? ''}`),
  );
  expect(found, `axe on ${page.url()}`).toEqual([]);
}
