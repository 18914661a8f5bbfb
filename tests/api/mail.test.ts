import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { findUnsureMails } from '../../api/features/mail/find-unsure-mails.job.ts';
import { sendMail } from '../../api/features/mail/send-mail.job.ts';
import { type MailToSend, queueMail } from '../../api/features/mail/queue-mail.ts';
import { Mail } from '../../api/models/Mail.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { type MadeStudio, makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
let made: MadeStudio;
beforeAll(async () => void (house = await startHouse()));
afterAll(() => house.stop());
beforeEach(async () => {
  house.mails.clear();
  house.mails.faults.clear();
  await house.ctx.knex.raw('delete from mails');
  await house.ctx.knex.raw('select graphile_worker.complete_jobs(array(select id from graphile_worker.jobs))');
  made = await makeStudio(house);
});

const queue = (values: Partial<MailToSend> = {}) =>
  house.ctx.knex.transaction((trx) =>
    queueMail(trx, {
      studioId: made.studio.id,
      kind: 'sheet-invitation',
      to: { address: 'oskar@tarn-brandreth.test', name: 'Oskar Lind' },
      fromName: made.studio.name,
      replyTo: made.studio.replyTo,
      subject: 'Proof sheet 1',
      text: `Open https://oriel.test/open/${'a'.repeat(43)} now`,
      html: `<p><a href="https://oriel.test/open/${'a'.repeat(43)}">Open</a></p>`,
      ...values,
    }),
  );
const find = (id: string) => Mail.query().findById(id).throwIfNotFound();
const tools = (values: { lastAttempt?: boolean } = {}) => ({
  signal: new AbortController().signal,
  attempt: 1,
  lastAttempt: false,
  ...values,
});
const run = (mailId: string, values = {}) => sendMail.run(house.ctx, { mailId }, tools(values));

describe('the outbox', () => {
  it('hands a mail over once, however often its job runs, and forgets its secret link', async () => {
    const id = await queue();
    await Promise.all([run(id), run(id), run(id)]);
    await run(id);
    expect(house.mails.mails()).toHaveLength(1);
    const mail = await find(id);
    expect(mail).toMatchObject({ state: 'sent', attempts: 1, problem: null });
    expect(mail.sentAt).not.toBeNull();
    expect(mail.text).toBe('Open https://oriel.test/open/… now');
    expect(mail.html).not.toContain('aaaa');
    expect(house.mails.mails()[0]?.text).toContain('a'.repeat(43));
  });

  it('writes nothing into the outbox when its transaction fails', async () => {
    await expect(
      house.ctx.knex.transaction(async (trx) => {
        await queueMail(trx, { kind: 'x', to: { address: 'a@b.test' }, fromName: 'x', subject: 'x', text: 'x', html: 'x' });
        throw new Error('on purpose');
      }),
    ).rejects.toThrow('on purpose');
    await house.runJobs();
    expect(await Mail.query().resultSize()).toBe(0);
    expect(house.mails.mails()).toEqual([]);
  });

  it('waits for another try when the server asks for it, through the queue', async () => {
    house.mails.faults.failNext({ code: 451, message: 'greylisted, come back later' });
    const id = await queue();
    await house.runJobs();
    expect(await find(id)).toMatchObject({ state: 'waiting', attempts: 1, problem: expect.stringContaining('greylisted') });
    const { rows } = await house.ctx.knex.raw<{ rows: { attempts: number; maxAttempts: number; later: boolean }[] }>(
      'select attempts, max_attempts, run_at > now() as later from graphile_worker.jobs where key = ?',
      [`send-mail:${id}`],
    );
    expect(rows).toEqual([{ attempts: 1, maxAttempts: 12, later: true }]);
    await house.ctx.knex.raw('select graphile_worker.reschedule_jobs(array(select id from graphile_worker.jobs), run_at := now())');
    await house.runJobs();
    expect(await find(id)).toMatchObject({ state: 'sent', attempts: 2 });
    expect(house.mails.mails()).toHaveLength(1);
  });

  it('gives up after the last try', async () => {
    house.mails.faults.failNext({ code: 451, times: 2 });
    const id = await queue();
    await expect(run(id)).rejects.toThrow('waits for another try');
    await run(id, { lastAttempt: true });
    expect(await find(id)).toMatchObject({ state: 'failed', attempts: 2 });
  });

  it('fails at once what the server will never take', async () => {
    house.mails.faults.failNext({ code: 550, message: 'no such mailbox' });
    const id = await queue();
    await house.runJobs();
    expect(await find(id)).toMatchObject({ state: 'failed', problem: expect.stringContaining('no such mailbox') });
    expect(await Mail.query().where({ id }).whereRaw("problem like '%550%'").resultSize()).toBe(1);
  });

  it('does not know, when the answer is lost after the mail was handed over, and sends no second one', async () => {
    house.mails.faults.failNext({ loseAnswer: true });
    const id = await queue();
    await house.runJobs();
    expect(await find(id)).toMatchObject({ state: 'unsure', problem: expect.stringContaining('may have gone out') });
    await house.runJobs();
    expect(house.mails.mails()).toHaveLength(1);
  });

  it('keeps a mail waiting while no server can be reached', async () => {
    const id = await queue();
    const ctx = { ...house.ctx, config: { ...house.ctx.config, mail: { ...house.ctx.config.mail, url: 'smtp://127.0.0.1:1' } } };
    await expect(sendMail.run(ctx, { mailId: id }, tools())).rejects.toThrow();
    expect(await find(id)).toMatchObject({ state: 'waiting', problem: 'The mail server could not be reached.' });
  });

  it('finds mails whose process died while handing over, and leaves those that are under way', async () => {
    const [died, busy] = [await queue(), await queue()];
    await Mail.query()
      .findById(died)
      .patch({ state: 'handing-over', handedOverAt: new Date(Date.now() - 6 * 60_000) });
    await Mail.query().findById(busy).patch({ state: 'handing-over', handedOverAt: new Date() });
    for (let times = 0; times < 2; times += 1) await findUnsureMails.run(house.ctx, {}, tools());
    await house.runJobs();
    expect(await find(died)).toMatchObject({ state: 'unsure', problem: expect.stringContaining('interrupted') });
    expect(await find(busy)).toMatchObject({ state: 'handing-over' });
    expect(house.mails.mails()).toEqual([]);
  });

  it('gives a waiting mail a new job where its own was lost', async () => {
    const id = await queue();
    await house.ctx.knex.raw('select graphile_worker.complete_jobs(array(select id from graphile_worker.jobs))');
    await Mail.query()
      .findById(id)
      .patch({ createdAt: new Date(Date.now() - 10 * 60_000) });
    await findUnsureMails.run(house.ctx, {}, tools());
    await house.runJobs();
    expect(await find(id)).toMatchObject({ state: 'sent' });
  });

  it('does not send what waits for a commission that was deleted until it is brought back, nor what is not there', async () => {
    const commission = await makeCommission(made.studio);
    const id = await queue({ commissionId: commission.id });
    await made.owner.agent.delete(`/api/commissions/${commission.id}`).expect(204);
    await house.runJobs();
    await run(randomUUID());
    expect(house.mails.mails()).toEqual([]);
    expect(await find(id)).toMatchObject({ state: 'waiting' });
    await made.owner.agent.post(`/api/commissions/${commission.id}/restore`).expect(200);
    await house.runJobs();
    expect(await find(id)).toMatchObject({ state: 'sent' });
    expect(house.mails.mails()).toHaveLength(1);
  });

  it('refuses an address that would end the header line, whoever wrote it into the table', async () => {
    const id = await queue({ to: { address: 'a@b.test\r\nBcc: c@d.test', name: 'x' } });
    const reply = await queue({ replyTo: 'a@b.test, c@d.test' });
    await house.runJobs();
    expect([(await find(id)).state, (await find(reply)).state]).toEqual(['failed', 'failed']);
    expect(house.mails.mails()).toEqual([]);
  });
});

describe("the studio's page of it", () => {
  it('shows state, address, subject and problem, in pages, newest first', async () => {
    for (let nth = 1; nth <= 5; nth += 1) await queue({ subject: `Mail ${nth}` });
    const subjects: string[] = [];
    let after = '';
    for (let page = 0; page < 5; page += 1) {
      const { body } = await made.assistant.agent.get(`/api/mails?limit=2${after}`).expect(200);
      subjects.push(...body.items.map((item: { subject: string }) => item.subject));
      if (!body.next) break;
      after = `&after=${body.next}`;
    }
    expect(subjects).toEqual(['Mail 5', 'Mail 4', 'Mail 3', 'Mail 2', 'Mail 1']);
  });

  it('filters by state and counts what a person has to look at', async () => {
    const [failed, unsure] = [await queue(), await queue(), await queue()];
    await Mail.query()
      .findById(failed ?? '')
      .patch({ state: 'failed', problem: 'no' });
    await Mail.query()
      .findById(unsure ?? '')
      .patch({ state: 'unsure', problem: 'perhaps' });
    const { agent } = made.owner;
    for (const [state, count] of Object.entries({ all: 3, open: 2, failed: 1, unsure: 1, waiting: 1, sent: 0 })) {
      const { body } = await agent.get(`/api/mails?state=${state}`).expect(200);
      expect([state, body.items.length, body.open]).toEqual([state, count, 2]);
    }
    await agent.get('/api/mails?state=elsewhere').expect(422);
  });

  it('sends again what failed or may have gone out, with the same Message-ID; once for two presses', async () => {
    house.mails.faults.failNext({ loseAnswer: true });
    const id = await queue();
    await house.runJobs();
    const { agent } = made.assistant;
    const answers = await Promise.all([1, 2].map(() => agent.post(`/api/mails/${id}/send-again`)));
    expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409]);
    await house.runJobs();
    expect((await find(id)).state).toBe('sent');
    const ids = house.mails.mails().map((mail) => mail.headers.find((header) => header.name === 'message-id')?.line);
    expect(ids).toEqual([`Message-ID: <${id}@localhost>`, `Message-ID: <${id}@localhost>`]);
    await agent.post(`/api/mails/${id}/send-again`).expect(409);
    await agent.post(`/api/mails/${id}/withdraw`).expect(409);
  });

  it('withdraws what has not gone out', async () => {
    const id = await queue();
    const { body } = await made.owner.agent.post(`/api/mails/${id}/withdraw`).expect(200);
    expect(body).toMatchObject({ state: 'withdrawn', can: { sendAgain: false, withdraw: false } });
    await house.runJobs();
    expect(house.mails.mails()).toEqual([]);
  });

  it('blots out the secret of a link before it was sent too', async () => {
    const id = await queue();
    const { body } = await made.owner.agent.get(`/api/mails/${id}`).expect(200);
    expect(body.text).toBe('Open https://oriel.test/open/… now');
    expect(JSON.stringify(body)).not.toContain('aaaaaaaa');
  });

  it('holds no mail of another studio, of an account alone, or, for assistants, of the team', async () => {
    const other = await makeStudio(house);
    const theirs = await queue({ studioId: other.studio.id });
    const reset = await queue({ studioId: null, kind: 'reset-password' });
    const team = await queue({ kind: 'join-studio' });
    const { owner, assistant } = made;
    for (const id of [theirs, reset]) {
      await owner.agent.get(`/api/mails/${id}`).expect(404);
      await owner.agent.post(`/api/mails/${id}/withdraw`).expect(404);
      await owner.agent.post(`/api/mails/${id}/send-again`).expect(404);
    }
    await assistant.agent.get(`/api/mails/${team}`).expect(404);
    await owner.agent.get(`/api/mails/${team}`).expect(200);
    expect((await owner.agent.get('/api/mails')).body.items).toHaveLength(1);
    expect((await assistant.agent.get('/api/mails')).body.items).toHaveLength(0);
    await house.request.get('/api/mails').expect(401);
    await owner.agent.get('/api/mails/not-an-id').expect(404);
  });
});
