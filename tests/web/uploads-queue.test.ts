import { describe, expect, it } from 'vitest';
import { TransportProblem } from '../../web/src/lib/uploads/transport.ts';
import { fileOf, startQueue } from './uploads-support.ts';

describe('sending', () => {
  it('sends every byte of every file, with never more than four requests under way', async () => {
    const { queue, server, clock, states } = startQueue();
    queue.add(Array.from({ length: 40 }, (_, at) => fileOf(`HL_${at}.jpg`, 15 + at)));
    await clock.pass(60_000);
    expect(new Set(Object.values(states()))).toEqual(new Set(['done']));
    expect(server.most).toBe(4);
    expect([...server.uploads.values()].map((one) => one.offer.size)).toEqual(Array.from({ length: 40 }, (_, at) => 15 + at));
  });

  it('asks before a byte is sent, and sends nothing of what the commission has', async () => {
    const { queue, server, clock, fileNamed } = startQueue();
    const known = fileOf('HL_0412.jpg', 30);
    server.known.add(`sum of ${await known.file.text()}`);
    queue.add([known]);
    await clock.pass(5_000);
    expect(fileNamed('HL_0412.jpg')).toMatchObject({ state: 'known', problem: 'It is in the commission already.' });
    expect(server.calls).toEqual(['offer HL_0412.jpg']);
    expect(queue.store.totals()).toMatchObject({ bytes: 0, files: 1, running: false });
  });

  it('sends only the parts that are not there', async () => {
    const { queue, server, clock, states } = startQueue();
    const file = fileOf('HL_0412.tif', 45);
    const offer = { name: 'HL_0412.tif', size: 45, lastModified: 0, sha256: `sum of ${await file.file.text()}` };
    server.uploads.set('up-1', {
      id: 'up-1',
      offer,
      state: 'open',
      parts: new Map([
        [1, 10],
        [3, 10],
      ]),
    });
    queue.add([file]);
    await clock.pass(5_000);
    expect(states()).toEqual({ 'HL_0412.tif': 'done' });
    const parts = server.calls.filter((call) => call.startsWith('part'));
    expect(parts).toEqual(['part HL_0412.tif 2', 'part HL_0412.tif 4', 'part HL_0412.tif 5']);
  });

  it('names junk and does not send it', async () => {
    const { queue, server, clock, files } = startQueue();
    queue.add([fileOf('.DS_Store', 9), fileOf('Thumbs.db', 9), fileOf('HL_1.jpg', 0), fileOf('HL_1.xmp', 9)]);
    await clock.pass(2_000);
    expect(files().map((file) => file.state)).toEqual(['left-out', 'left-out', 'left-out', 'left-out']);
    expect(files()[2]?.problem).toBe('The file is empty (0 bytes).');
    expect(server.calls).toEqual([]);
    expect(queue.store.totals().files).toBe(0);
  });

  it('sends two files with the same bytes once', async () => {
    const { queue, server, clock, files } = startQueue();
    const one = fileOf('HL_1.jpg', 25, 'card 1/');
    queue.add([one, { file: new File([await one.file.text()], 'copy.jpg'), path: 'card 2/copy.jpg' }]);
    await clock.pass(5_000);
    expect(files().map((file) => [file.path, file.state, file.problem])).toEqual([
      ['card 1/HL_1.jpg', 'done', undefined],
      ['card 2/copy.jpg', 'known', 'The same picture as card 1/HL_1.jpg.'],
    ]);
    expect(server.uploads.size).toBe(1);
  });

  it('sends the second of two equal files when the first is taken out', async () => {
    const { queue, clock, fileNamed, states } = startQueue();
    const one = fileOf('HL_1.jpg', 250);
    queue.add([one, { file: new File([await one.file.text()], 'copy.jpg'), path: 'copy.jpg' }]);
    await clock.pass(60);
    expect(states()).toEqual({ 'HL_1.jpg': 'sending', 'copy.jpg': 'known' });
    queue.cancel(fileNamed('HL_1.jpg').id);
    await clock.pass(20_000);
    expect(states()).toEqual({ 'copy.jpg': 'done' });
  });

  it('does not double a file that is dropped again', async () => {
    const { queue, clock, files } = startQueue();
    queue.add([fileOf('HL_1.jpg', 25)]);
    queue.add([fileOf('HL_1.jpg', 25), fileOf('HL_1.jpg', 25, 'another folder/')]);
    await clock.pass(5_000);
    expect(files().map((file) => file.path)).toEqual(['HL_1.jpg', 'another folder/HL_1.jpg']);
  });
});

describe('refusals', () => {
  it('shows the sentence of a refused offer, keeps the rest going, and tries again when asked', async () => {
    const { queue, server, clock, fileNamed, states } = startQueue();
    server.trouble = (call, detail) =>
      call === 'offer' && detail === 'huge.tif' ? new TransportProblem('refused', 'The file is larger than 500 MB.') : undefined;
    queue.add([fileOf('huge.tif', 40), fileOf('HL_2.jpg', 40)]);
    await clock.pass(5_000);
    expect(states()).toEqual({ 'huge.tif': 'failed', 'HL_2.jpg': 'done' });
    expect(fileNamed('huge.tif').problem).toBe('The file is larger than 500 MB.');
    server.trouble = () => undefined;
    queue.retry(fileNamed('huge.tif').id);
    await clock.pass(5_000);
    expect(fileNamed('huge.tif')).toMatchObject({ state: 'done', sent: 40 });
    expect(fileNamed('huge.tif').problem).toBeUndefined();
  });

  it('shows why the check of a whole file failed', async () => {
    const { queue, server, clock, fileNamed } = startQueue();
    server.verdict = () => 'The file ends in the middle of the picture.';
    queue.add([fileOf('HL_1.jpg', 40)]);
    await clock.pass(5_000);
    expect(fileNamed('HL_1.jpg')).toMatchObject({ state: 'failed', problem: 'The file ends in the middle of the picture.' });
    server.verdict = () => undefined;
    queue.retryFailed();
    await clock.pass(5_000);
    expect(fileNamed('HL_1.jpg').state).toBe('done');
  });

  it('fails a file that cannot be read any more, instead of trying for ever', async () => {
    const { queue, server, clock, fileNamed } = startQueue();
    const found = fileOf('HL_1.jpg', 40);
    queue.add([found]);
    server.trouble = (call) => (call === 'part' ? new TransportProblem('line', 'No answer.') : undefined);
    await clock.pass(50);
    found.file.slice = () => ({ arrayBuffer: () => Promise.reject(new Error('NotReadableError')) }) as unknown as Blob;
    await clock.pass(5_000);
    expect(fileNamed('HL_1.jpg')).toMatchObject({
      state: 'failed',
      problem: 'The file cannot be read any more: it was moved, renamed or changed.',
    });
  });

  it('gives a file up when the server breaks over it eight times in a row', async () => {
    const { queue, server, clock, states } = startQueue();
    server.trouble = (call, detail) =>
      call === 'part' && detail.startsWith('bad') ? new TransportProblem('server', 'The server failed.') : undefined;
    queue.add([fileOf('bad.jpg', 10), fileOf('good.jpg', 10)]);
    await clock.pass(10_000);
    expect(states()).toEqual({ 'bad.jpg': 'retrying', 'good.jpg': 'done' });
    await clock.pass(300_000);
    expect(states()).toEqual({ 'bad.jpg': 'failed', 'good.jpg': 'done' });
    expect(server.calls.filter((call) => call === 'part bad.jpg 1')).toHaveLength(8);
  });

  it('stops everything when the session is over, and goes on after the person signed in', async () => {
    const { queue, server, clock, states } = startQueue();
    server.trouble = (call) => (call === 'part' ? new TransportProblem('signed-out', 'Your session has ended.') : undefined);
    queue.add([fileOf('HL_1.jpg', 40), fileOf('HL_2.jpg', 40)]);
    await clock.pass(60_000);
    expect(queue.store.totals()).toMatchObject({ paused: true, problem: 'Your session has ended.', running: false });
    server.trouble = () => undefined;
    queue.resume();
    await clock.pass(5_000);
    expect(states()).toEqual({ 'HL_1.jpg': 'done', 'HL_2.jpg': 'done' });
  });
});

describe('the person', () => {
  it('pauses: nothing is sent, and nothing that is there is sent again', async () => {
    const { queue, server, clock, states } = startQueue();
    queue.add([fileOf('HL_1.jpg', 200)]);
    await clock.pass(60);
    queue.pause();
    expect(server.inFlight).toBe(4);
    await clock.pass(60_000);
    expect(server.inFlight).toBe(0);
    const before = server.calls.length;
    expect(queue.store.totals()).toMatchObject({ paused: true, running: false, perSecond: undefined });
    const there = [...(server.uploads.get('up-1')?.parts.keys() ?? [])];
    queue.resume();
    await clock.pass(60_000);
    expect(states()).toEqual({ 'HL_1.jpg': 'done' });
    const after = server.calls.slice(before).filter((call) => call.startsWith('part'));
    expect(there.length).toBeGreaterThan(0);
    for (const number of there) expect(after).not.toContain(`part HL_1.jpg ${number}`);
  });

  it('cancels: the server is told to give up the parts', async () => {
    const { queue, server, clock, files, fileNamed, shelf } = startQueue();
    queue.add([fileOf('HL_1.jpg', 200)]);
    await clock.pass(60);
    queue.cancel(fileNamed('HL_1.jpg').id);
    await clock.pass(5_000);
    expect(files()).toEqual([]);
    expect(server.calls.at(-1)).toBe('abandon up-1');
    expect(server.inFlight).toBe(0);
    expect(shelf.files.size).toBe(0);
  });

  it('clears what is finished out of the list', async () => {
    const { queue, server, clock, states } = startQueue();
    server.verdict = (name) => (name === 'bad.jpg' ? 'Not a picture.' : undefined);
    queue.add([fileOf('HL_1.jpg', 20), fileOf('bad.jpg', 20), fileOf('.hidden', 3)]);
    await clock.pass(5_000);
    queue.clearFinished();
    expect(states()).toEqual({ 'bad.jpg': 'failed' });
  });
});
