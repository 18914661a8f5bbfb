import { mkdtempSync, rmSync } from 'node:fs';
import http from 'node:http';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { createTransport } from 'nodemailer';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { type RunningMailCatcher, startMailCatcher } from '../../docker-free-dev/mail-catcher.ts';

let dir: string;
let catcher: RunningMailCatcher;
beforeAll(async () => {
  dir = mkdtempSync(path.join(tmpdir(), 'oriel-mails-'));
  catcher = await startMailCatcher({ dir });
});
afterEach(() => {
  catcher.clear();
  catcher.faults.clear();
});
afterAll(async () => {
  await catcher.stop();
  rmSync(dir, { recursive: true, force: true });
});

const MAIL = { from: 'Harrow Lane Studio <studio@harrow.example>', to: 'Ines Okafor <ines@tarn.example>', subject: 'Proofs', text: 'Look' };

async function deliver(mail: object = {}) {
  const transport = createTransport({ host: '127.0.0.1', port: catcher.smtpPort, secure: false });
  try {
    return await transport.sendMail({ ...MAIL, ...mail });
  } finally {
    transport.close();
  }
}

const page = async (at = '') => {
  const answer = await fetch(new URL(at, catcher.pageAddress));
  return { status: answer.status, headers: answer.headers, text: await answer.text() };
};
const last = () => catcher.mails().at(-1);

describe('a caught mail', () => {
  it('reads as it was written: alphabets, long lines, a lone dot', async () => {
    const text = `Čistý pohled\n.\n${'x'.repeat(10_000)}\n🏙️ end`;
    await deliver({ subject: 'Náhledy: Ropewalk Library 🏙️', text });
    expect(last()).toMatchObject({ subject: 'Náhledy: Ropewalk Library 🏙️', to: '"Ines Okafor" <ines@tarn.example>' });
    expect(last()?.text.trim()).toBe(text);
  });

  it('keeps the envelope apart from the headers', async () => {
    await deliver({ envelope: { from: 'bounce@harrow.example', to: ['hidden+1@tarn.example'] } });
    expect(last()?.envelope).toEqual({ from: 'bounce@harrow.example', to: ['hidden+1@tarn.example'] });
    expect(last()?.to).not.toContain('hidden');
  });

  it('comes in the order of arrival and is there after a restart', async () => {
    for (const subject of ['first', 'second', 'third']) await deliver({ subject, html: '<p>Look</p>' });
    const before = catcher.mails();
    await catcher.stop();
    catcher = await startMailCatcher({ dir });
    expect(catcher.mails()).toEqual(before);
    expect(before.map((mail) => mail.subject)).toEqual(['first', 'second', 'third']);
  });
});

describe('the page', () => {
  it('lists mails newest first, and says what to do where there is none', async () => {
    expect((await page()).text).toContain('No mail yet');
    for (const subject of ['older <b>', 'newer']) await deliver({ subject });
    const { text } = await page();
    expect(text.indexOf('newer')).toBeLessThan(text.indexOf('older &lt;b&gt;'));
    expect(text).not.toContain('<b>');
  });

  it('shows text with links, headers, raw source', async () => {
    await deliver({ subject: '"><script>alert(1)</script>', text: 'Open http://127.0.0.1:4400/open/abc?a=1&b=2. <img src=x>' });
    const { text } = await page(`/mails/${last()?.id}`);
    expect(text).toContain('href="http://127.0.0.1:4400/open/abc?a=1&amp;b=2"');
    expect(text).not.toMatch(/<script|<img/);
    expect(text).toContain('Message-ID: ');
    const source = await page(`/mails/${last()?.id}/source`);
    expect([source.headers.get('content-type'), source.text]).toEqual(['text/plain; charset=utf-8', expect.stringContaining('\r\n\r\n')]);
  });

  it("keeps a mail's HTML in a frame without scripts, forms or this page's origin", async () => {
    await deliver({ html: '<h1>Proofs</h1><script>parent.alert(1)</script><a href="http://127.0.0.1:4400/">go</a>' });
    const outer = await page(`/mails/${last()?.id}`);
    expect(outer.text).toMatch(/<iframe sandbox="allow-popups allow-popups-to-escape-sandbox"/);
    expect(outer.headers.get('content-security-policy')).toMatch(/^default-src 'none'/);
    const inner = await page(`/mails/${last()?.id}/html`);
    const policy = inner.headers.get('content-security-policy') ?? '';
    expect(policy).toMatch(/^sandbox (?!.*allow-scripts)(?!.*allow-same-origin)/);
    expect(policy).toContain("default-src 'none'");
    expect(policy).not.toContain('script-src');
  });

  it('goes on to older mails in pages of a hundred', async () => {
    const transport = createTransport({ host: '127.0.0.1', port: catcher.smtpPort, pool: true });
    for (let number = 1; number <= 101; number += 1) await transport.sendMail({ ...MAIL, subject: `number ${number}.` });
    transport.close();
    const first = await page();
    expect(first.text).not.toContain('number 1.');
    const [, older = ''] = /href="(\/\?before=[^"]+)"/.exec(first.text) ?? [];
    expect((await page(older)).text).toContain('number 1.');
  });

  it('answers no name but those of this machine, so that no foreign page reads the mails', async () => {
    const status = await new Promise((resolve) => {
      http.get({ host: '127.0.0.1', port: catcher.pagePort, headers: { host: 'evil.example' } }, (answer) =>
        resolve(answer.resume().statusCode),
      );
    });
    expect(status).toBe(421);
    expect((await page('/mails/nothing')).status).toBe(404);
  });
});

describe('faults on demand', () => {
  it('refuse so many mails, then take them again', async () => {
    catcher.faults.failNext({ code: 451, message: 'Try again later', times: 2 });
    await expect(deliver()).rejects.toMatchObject({ responseCode: 451 });
    await expect(deliver()).rejects.toMatchObject({ responseCode: 451 });
    await deliver();
    expect(catcher.mails()).toHaveLength(1);
  });

  it('refuse one recipient for good', async () => {
    catcher.faults.failNext({ code: 550, to: 'gone@', times: 9 });
    await expect(deliver({ to: 'gone@tarn.example' })).rejects.toMatchObject({ responseCode: 550 });
    await deliver();
    expect(catcher.mails()).toHaveLength(1);
  });

  it('lose the answer after the mail was kept', async () => {
    catcher.faults.failNext({ loseAnswer: true });
    await expect(deliver()).rejects.toThrow();
    expect(catcher.mails()).toHaveLength(1);
  });
});
