import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { loadConfig } from '../../api/config.ts';
import { writeMail } from '../../api/features/mail/layout.ts';
import { handOver, type Letter } from '../../api/services/mail.ts';

let raws: { from: string; to: string[]; raw: Buffer }[] = [];
const server = new SMTPServer({
  authOptional: true,
  disabledCommands: ['STARTTLS'],
  disableReverseLookup: true,
  logger: false,
  onData(stream, session, done) {
    const chunks: Buffer[] = [];
    stream.on('data', (chunk: Buffer) => chunks.push(chunk));
    stream.on('end', () => {
      const { mailFrom, rcptTo } = session.envelope;
      raws.push({ from: mailFrom ? mailFrom.address : '', to: rcptTo.map(({ address }) => address), raw: Buffer.concat(chunks) });
      done();
    });
  },
});
let config: ReturnType<typeof loadConfig>;

beforeAll(async () => {
  const inner = server.listen(0, '127.0.0.1');
  await once(inner, 'listening');
  config = loadConfig({
    ORIEL_DATABASE_URL: 'postgres://not-asked',
    ORIEL_STORE_ACCESS_KEY: 'x',
    ORIEL_STORE_SECRET_KEY: 'x',
    ORIEL_SMTP_URL: `smtp://127.0.0.1:${(inner.address() as AddressInfo).port}`,
    ORIEL_MAIL_FROM: 'oriel@harrow-lane.test',
    ORIEL_SECRET: 'x'.repeat(40),
  });
});
afterAll(() => new Promise<void>((resolve) => server.close(() => resolve())));
beforeEach(() => void (raws = []));

const LETTER: Letter = {
  messageId: '<2f6c@harrow-lane.test>',
  to: { address: 'oskar@tarn-brandreth.test', name: 'Oskar Lind' },
  fromName: 'Harrow Lane Studio',
  replyTo: 'studio@harrow-lane.test',
  subject: 'Proof sheet 1: Ropewalk Library',
  text: 'Good day',
  html: '<p>Good day</p>',
};

async function send(values: Partial<Letter>) {
  const outcome = await handOver(config, { ...LETTER, ...values });
  const [got] = raws;
  if (!got) throw new Error(`Nothing arrived: ${JSON.stringify(outcome)}`);
  const text = got.raw.toString('latin1');
  const [head = ''] = text.split('\r\n\r\n');
  return { got, text, head, lines: text.split('\r\n'), parsed: await simpleParser(got.raw), outcome };
}

const headers = (head: string, name: string) => head.split('\r\n').filter((line) => line.toLowerCase().startsWith(`${name}:`));

const HARD = {
  subject: `Příliš žluťoučký kůň: ${'Проба 🌉 '.repeat(20)}`,
  fromName: 'Студия Харроу 🏛️, "quoted" <odd>',
  to: { address: 'oskar+proofs@tarn-brandreth.test', name: '🌉 Oskar, Lind; (the younger)' },
  text: `one\n.\n..two\n.three\n${'x'.repeat(10_000)}\n${'длинная строка '.repeat(400)}\nlast`,
  html: `<p>one</p>\n.\n<p>${'y'.repeat(10_000)}</p>`,
};

describe('a mail on the wire', () => {
  it('keeps to the lengths of RFC 5322 2.1.1 and RFC 2045 6.7 and 6.8, in ASCII, with CRLF alone', async () => {
    const { lines, text, head } = await send(HARD);
    expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(78);
    const body = lines.slice(head.split('\r\n').length);
    expect(Math.max(...body.map((line) => line.length))).toBeLessThanOrEqual(76);
    expect([...text].every((character) => character <= '~' || character === '\r')).toBe(true);
    expect(text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
  });

  it('has exactly one Date, From, Message-ID, Subject and To (RFC 5322 3.6)', async () => {
    const { head } = await send(HARD);
    for (const name of ['date', 'from', 'message-id', 'subject', 'to', 'reply-to', 'mime-version']) {
      expect([name, headers(head, name).length]).toEqual([name, 1]);
    }
    expect(headers(head, 'message-id')).toEqual(['Message-ID: <2f6c@harrow-lane.test>']);
    expect(headers(head, 'auto-submitted')).toEqual(['Auto-Submitted: auto-generated']);
  });

  it('splits encoded words as RFC 2047 2 and 5 ask: 75 characters at most, no character in two of them', async () => {
    const { head } = await send(HARD);
    const words = head.match(/=\?[^?]+\?[BQ]\?[^?]*\?=/gi) ?? [];
    expect(words.length).toBeGreaterThan(3);
    for (const word of words) {
      expect(word.length).toBeLessThanOrEqual(75);
      const [, , encoding = '', content = ''] = word.split('?');
      const bytes =
        encoding.toUpperCase() === 'B'
          ? Buffer.from(content, 'base64')
          : Buffer.from(
              content.replaceAll('_', ' ').replace(/=([0-9A-F]{2})/gi, (_all, hex: string) => String.fromCharCode(parseInt(hex, 16))),
              'latin1',
            );
      expect(() => new TextDecoder('utf-8', { fatal: true }).decode(bytes)).not.toThrow();
    }
  });

  it('is read by mailparser as it was written: a lone dot, an emoji, a plus, 10,000 characters in a line', async () => {
    const { parsed, got } = await send(HARD);
    expect(parsed.subject).toBe(HARD.subject.trim());
    expect(parsed.text?.trimEnd()).toBe(HARD.text);
    expect(parsed.html).toContain('y'.repeat(10_000));
    expect(parsed.from?.value).toEqual([{ address: 'oriel@harrow-lane.test', name: HARD.fromName }]);
    expect([parsed.to].flat()[0]?.value).toEqual([{ address: HARD.to.address, name: HARD.to.name }]);
    expect(parsed.replyTo?.text).toBe('studio@harrow-lane.test');
    expect(got).toMatchObject({ from: 'oriel@harrow-lane.test', to: [HARD.to.address] });
  });

  it.each([
    ['the name of the reader', { to: { address: 'oskar@tarn-brandreth.test', name: 'Oskar\r\nBcc: evil@example.test' } }],
    ['the name of the studio', { fromName: 'Harrow\r\nBcc: evil@example.test\r\n\r\nbody' }],
    ['the subject', { subject: 'Proofs\r\nBcc: evil@example.test\r\n\r\nbody' }],
    ['the subject, with a bare LF', { subject: 'Proofs\nBcc: evil@example.test' }],
    ['the subject, with NEL and LS', { subject: 'Proofs\u0085Bcc: evil@example.test\u2028Cc: evil@example.test' }],
  ])('grows no header and no reader out of %s', async (_where, values) => {
    const { head, got, parsed } = await send(values);
    expect([...headers(head, 'bcc'), ...headers(head, 'cc')]).toEqual([]);
    expect(got.to).toEqual(['oskar@tarn-brandreth.test']);
    expect([parsed.bcc, parsed.cc]).toEqual([undefined, undefined]);
    expect(parsed.text?.trim()).toBe('Good day');
  });

  it.each([
    'oskar@tarn-brandreth.test\r\nBcc: evil@example.test',
    'oskar@tarn-brandreth.test, evil@example.test',
    'evil@example.test> <oskar@tarn-brandreth.test',
    'Oskar <oskar@tarn-brandreth.test>',
    'oskar@tarn-brandreth.test SIZE=1',
    '',
  ])('never goes to %j', async (address) => {
    expect(await handOver(config, { ...LETTER, to: { address, name: '' } })).toMatchObject({ is: 'never' });
    expect(await handOver(config, { ...LETTER, replyTo: `${address},` })).toMatchObject({ is: 'never' });
    expect(raws).toEqual([]);
  });
});

describe('the layout', () => {
  const letter = {
    subject: 'A & B\r\nBcc: c@d.test',
    studioName: '<b>Harrow & Lane</b>',
    replyTo: 'studio@harrow-lane.test',
    greeting: 'Good day <script>alert(1)</script>,',
    paragraphs: ['First "line"\nsecond line'],
    quote: { by: 'Ines Okafor', words: 'Please look <img src=x onerror=alert(1)>\n\nat proof 7' },
    facts: [{ label: 'Choose by', value: '17 November 2026' }],
    action: { words: 'Open the proof sheet', address: 'https://oriel.test/open/abc?x=1&y="2"' },
    why: 'You get this because.',
  };

  it('says the same in text and in HTML, and escapes what people wrote', async () => {
    const { parsed } = await send(writeMail(letter));
    const html = typeof parsed.html === 'string' ? parsed.html : '';
    for (const piece of [
      'First',
      'second line',
      'Choose by',
      '17 November 2026',
      'at proof 7',
      'Open the proof sheet',
      'You get this because.',
    ]) {
      expect([piece, parsed.text?.includes(piece), html.includes(piece)]).toEqual([piece, true, true]);
    }
    expect(parsed.subject).toBe('A & B Bcc: c@d.test');
    expect(html).not.toMatch(/<script|<img|<b>Harrow/);
    expect(html.match(/href="([^"]*)"/g)).toEqual(Array(2).fill('href="https://oriel.test/open/abc?x=1&amp;y=&quot;2&quot;"'));
    expect(parsed.text).toContain('> Please look <img src=x onerror=alert(1)>');
  });

  it('loads nothing from elsewhere, uses no table and sets no colours that a dark page would spoil', () => {
    const { html } = writeMail(letter);
    expect(html).not.toMatch(/<(img|link|script|table|style|iframe)\b/i);
    expect(html).not.toMatch(/url\(|background|[^-]color:#/);
    expect(html).toContain('<meta name="color-scheme" content="light dark">');
    expect(html).not.toMatch(/(?<!max-)width:\s*\d{3,}px/);
  });
});
