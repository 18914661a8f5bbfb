import { afterEach, describe, expect, it, vi } from 'vitest';
import { api, ApiProblem } from '../../web/src/lib/api.ts';
import { formatBytes, formatTimeLeft } from '../../web/src/lib/bytes.ts';
import { daysLeft, formatAge, formatDay, formatTime, formatTimeWithZone, formatWallClock } from '../../web/src/lib/dates.ts';
import { worthRetrying } from '../../web/src/lib/query-client.ts';

afterEach(() => vi.unstubAllGlobals());

/** Answers every request with one answer and remembers what was asked. */
function answerWith(status: number, body: unknown, headers: Record<string, string> = { 'content-type': 'application/json' }) {
  const asked: { address: string; init: RequestInit }[] = [];
  vi.stubGlobal('fetch', (address: string, init: RequestInit) => {
    asked.push({ address, init });
    return Promise.resolve(new Response(status === 204 ? null : JSON.stringify(body), { status, headers }));
  });
  return asked;
}
const refusal = (call: Promise<unknown>) =>
  call.then(
    () => undefined,
    (error: unknown) => error as ApiProblem,
  );

describe('the API client', () => {
  it('sends JSON, a version as If-Match, and only the query values that are set', async () => {
    const asked = answerWith(200, { ok: true });
    await api.patch('/api/commissions/1', { title: 'Basin bridges' }, { version: 7, query: { after: undefined, limit: 5 } });
    expect(asked[0]?.address).toBe('/api/commissions/1?limit=5');
    expect(asked[0]?.init).toMatchObject({ method: 'PATCH', body: '{"title":"Basin bridges"}', credentials: 'same-origin' });
    expect(asked[0]?.init.headers).toMatchObject({ 'if-match': '"7"', 'content-type': 'application/json' });
  });

  it('gives undefined for an answer without content', async () => {
    answerWith(204, null);
    expect(await api.delete('/api/commissions/1')).toBeUndefined();
  });

  it('throws the server’s sentence, code and wrong fields', async () => {
    const body = {
      detail: 'Some fields need another look.',
      code: 'x',
      errors: [{ path: 'email', message: 'This is no e-mail address.' }],
    };
    answerWith(422, body, { 'content-type': 'application/problem+json' });
    const problem = await refusal(api.post('/api/sign-in', {}));
    expect(problem).toMatchObject({ status: 422, detail: body.detail, code: 'x', errors: body.errors });
  });

  it('has a sentence of its own where the answer is no problem document', async () => {
    answerWith(502, '<html>', { 'content-type': 'text/html' });
    expect(await refusal(api.get('/api/desk'))).toMatchObject({ status: 502, detail: 'The server failed. Please try again.' });
  });

  it('says that no answer came, and how long to wait where the server says so', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')));
    expect(await refusal(api.get('/api/desk'))).toMatchObject({ status: 0, message: expect.stringContaining('check your connection') });
    answerWith(429, { detail: 'Too often.' }, { 'content-type': 'application/problem+json', 'retry-after': '30' });
    expect(await refusal(api.get('/api/desk'))).toMatchObject({ status: 429, retryAfter: 30 });
  });

  it('lets an aborted request be an aborted request', async () => {
    const stop = new AbortController();
    vi.stubGlobal('fetch', () => Promise.reject(new DOMException('stopped', 'AbortError')));
    stop.abort();
    expect(await refusal(api.get('/api/desk', { signal: stop.signal }))).toMatchObject({ name: 'AbortError' });
  });

  it('tries again what may come through, never a refusal', () => {
    expect(worthRetrying(0, new ApiProblem(0, ''))).toBe(true);
    expect(worthRetrying(1, new ApiProblem(503, ''))).toBe(true);
    expect(worthRetrying(2, new ApiProblem(503, ''))).toBe(false);
    expect(worthRetrying(0, new ApiProblem(404, ''))).toBe(false);
  });
});

describe('dates', () => {
  it('names a plain day the same in every zone', () => {
    for (const zone of ['Pacific/Auckland', 'America/Los_Angeles', undefined]) expect(formatDay('2026-11-03', zone)).toBe('3 Nov 2026');
  });

  it('shows a moment in the zone that is asked for', () => {
    expect(formatTime('2026-11-17T23:30:00Z', 'Europe/London')).toBe('17 Nov 2026, 23:30');
    expect(formatTime('2026-11-17T23:30:00Z', 'Asia/Tokyo')).toBe('18 Nov 2026, 08:30');
    expect(formatTimeWithZone('2026-11-17T23:59:00Z', 'Europe/London')).toBe('17 Nov 2026, 23:59 GMT');
    expect(formatTimeWithZone('2026-07-17T22:59:00Z', 'Europe/London')).toBe('17 Jul 2026, 23:59 BST');
  });

  it('writes every month with three letters', () => {
    expect(formatDay('2026-09-05')).toBe('5 Sep 2026');
  });

  it('shows a camera’s clock as it was set', () => {
    expect(formatWallClock('2026-10-28T17:06:12')).toBe('28 Oct 2026, 17:06');
    expect(formatWallClock('2026-10-28T17:06:12.25+09:00')).toBe('28 Oct 2026, 17:06');
  });

  it('tells ages and what is left', () => {
    const now = new Date('2026-12-01T12:00:00Z');
    expect(formatAge('2026-12-01T11:59:40Z', now)).toBe('just now');
    expect(formatAge('2026-12-01T10:00:00Z', now)).toBe('2 hours ago');
    expect(formatAge('2026-12-02T12:00:00Z', now)).toBe('tomorrow');
    expect(formatAge('2026-10-01T10:00:00Z', now)).toBe('1 Oct 2026');
    expect(daysLeft('2026-12-03T23:59:59Z', now)).toBe(3);
    expect(daysLeft('2026-11-30T23:59:59Z', now)).toBe(0);
  });
});

describe('bytes and time left', () => {
  it('counts in decimal units with one decimal below 100', () => {
    expect([0, 999, 1000, 31_240_000, 348_000_000, 999_600_000, 5_100_000_000].map(formatBytes)).toEqual([
      '0 B',
      '999 B',
      '1.0 kB',
      '31.2 MB',
      '348 MB',
      '1.0 GB',
      '5.1 GB',
    ]);
  });

  it('says nothing where the time left cannot be told', () => {
    expect([null, NaN, Infinity, -1].map(formatTimeLeft)).toEqual(['', '', '', '']);
    expect([3, 38, 355, 7800].map(formatTimeLeft)).toEqual([
      'about 5 s left',
      'about 40 s left',
      'about 6 min left',
      'about 2 h 10 min left',
    ]);
  });
});
