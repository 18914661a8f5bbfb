import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { hashPassword } from '../../api/features/sign-in/passwords.ts';
import { Account } from '../../api/models/Account.ts';
import { AccountToken } from '../../api/models/AccountToken.ts';
import { Membership } from '../../api/models/Membership.ts';
import { Studio } from '../../api/models/Studio.ts';
import { makeAccount, makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';
import { newestMail, tokenIn } from '../support/mail-links.ts';

const PASSWORD = 'copper gutters drip at noon';
let house: House;
beforeAll(async () => void (house = await startHouse()));
afterAll(() => house.stop());
beforeEach(() => house.mails.clear());

let counter = 0;
const signUpOf = (values: object = {}) => ({
  studioName: 'Lantern Wharf',
  name: 'Edda Marlow',
  email: `edda-${(counter += 1)}@lantern-wharf.test`,
  password: PASSWORD,
  ...values,
});

async function signUp(values: object = {}) {
  const input = signUpOf(values);
  const answer = await house.request.post('/api/sign-up').send(input);
  await house.runJobs();
  return { input, answer };
}

/** A confirmed owner, with an agent that is signed in. */
async function makeOwner(values: object = {}) {
  const { input } = await signUp(values);
  const agent = house.agent();
  await agent
    .post('/api/confirm-email')
    .send({ token: tokenIn(house, input.email, 'confirm-email'), password: input.password })
    .expect(200);
  return { input, agent };
}

describe('signing up', () => {
  it('creates a studio and its owner, who cannot sign in before the address is confirmed', async () => {
    const { input, answer } = await signUp({ timeZone: 'Europe/Prague' });
    expect(answer.status).toBe(202);
    const account = await Account.query().findOne({ email: input.email }).withGraphFetched('membership').throwIfNotFound();
    expect(account).toMatchObject({ name: 'Edda Marlow', emailConfirmedAt: null, membership: { role: 'owner' } });
    const studio = await Studio.query().findById(account.membership?.studioId ?? '');
    expect(studio).toMatchObject({ name: 'Lantern Wharf', replyTo: input.email, timeZone: 'Europe/Prague', currency: 'GBP' });
    await house.request.post('/api/sign-in').send(input).expect(401);
  });

  it('confirms with the link and the password together, once, and begins a session', async () => {
    const { input } = await signUp();
    const token = tokenIn(house, input.email, 'confirm-email');
    const look = await house.request.post('/api/confirm-email/look').send({ token }).expect(200);
    expect(look.body).toEqual({ email: input.email, studioName: 'Lantern Wharf' });
    const wrong = await house.request.post('/api/confirm-email').send({ token, password: 'another password' }).expect(422);
    expect(wrong.body.errors[0].path).toBe('password');
    const agent = house.agent();
    const me = await agent.post('/api/confirm-email').send({ token, password: PASSWORD }).expect(200);
    expect(me.body).toMatchObject({ role: 'owner', account: { email: input.email }, can: { team: true, money: true, leave: false } });
    await agent.get('/api/me').expect(200);
    const again = await house.request.post('/api/confirm-email').send({ token, password: PASSWORD }).expect(410);
    expect(again.body.code).toBe('link-used');
    await house.request.post('/api/sign-in').send({ email: input.email.toUpperCase(), password: PASSWORD }).expect(200);
  });

  it('answers a known address like a new one and changes nothing; its holder gets a mail', async () => {
    const { input } = await makeOwner();
    const before = await Studio.query().resultSize();
    const { answer } = await signUp({ email: input.email, studioName: 'Somebody Else', password: 'quite another set of words' });
    const { answer: fresh } = await signUp();
    expect([answer.status, answer.body]).toEqual([fresh.status, fresh.body]);
    expect(await Studio.query().resultSize()).toBe(before + 1);
    expect(newestMail(house, input.email).subject).toBe('You have an account already');
    await house.request.post('/api/sign-in').send({ email: input.email, password: PASSWORD }).expect(200);
  });

  it('does not let a second sign-up change the password of one that waits', async () => {
    const { input } = await signUp();
    await signUp({ email: input.email, password: 'a stranger chose these words' });
    const token = tokenIn(house, input.email, 'confirm-email');
    await house.request.post('/api/confirm-email').send({ token, password: 'a stranger chose these words' }).expect(422);
    await house.request.post('/api/confirm-email').send({ token, password: PASSWORD }).expect(200);
  });

  it('gives a guest a studio only once they confirm, with the password of that sign-up', async () => {
    const guest = await makeAccount({ email: 'quiet-guest@tarn-brandreth.test', name: 'Oskar Lind' });
    await signUp({ email: guest.email, studioName: 'Lind Pictures' });
    expect(await Membership.query().where({ accountId: guest.id })).toEqual([]);
    expect((await Account.query().findById(guest.id))?.passwordHash).toBeNull();
    const token = tokenIn(house, guest.email, 'confirm-email');
    const me = await house.request.post('/api/confirm-email').send({ token, password: PASSWORD }).expect(200);
    expect(me.body).toMatchObject({ role: 'owner', studio: { name: 'Lind Pictures' } });
  });

  it('sends a new confirmation in place of an expired one, to the same address', async () => {
    const { input } = await signUp();
    const token = tokenIn(house, input.email, 'confirm-email');
    await AccountToken.query()
      .where({ email: input.email })
      .patch({ expiresAt: new Date(Date.now() - 1000) });
    const expired = await house.request.post('/api/confirm-email/look').send({ token }).expect(410);
    expect(expired.body.code).toBe('link-expired');
    house.mails.clear();
    const known = await house.request.post('/api/confirm-email/again').send({ token }).expect(202);
    const unknown = await house.request
      .post('/api/confirm-email/again')
      .send({ token: 'x'.repeat(43) })
      .expect(202);
    expect(known.body).toEqual(unknown.body);
    await house.runJobs();
    expect(house.mails.mails().map((mail) => mail.envelope.to)).toEqual([[input.email]]);
    await house.request
      .post('/api/confirm-email')
      .send({ token: tokenIn(house, input.email, 'confirm-email'), password: PASSWORD })
      .expect(200);
  });

  it.each([
    ['short', 'elevenchars', 'At least 12 characters'],
    ['longer than 128 characters', 'ab '.repeat(43), 'At most 128 characters'],
    ['on the list of common ones', 'qwerty123456', 'tried first'],
    ['a common one with what most people add', 'Liverpool2024!', 'tried first'],
    ['one pattern again and again', 'abcabcabcabcabc', 'one pattern'],
    ['a row', 'abcdefghijklmn', 'one pattern'],
    ['mostly the studio', 'lantern-wharf-1', 'your own address or name'],
    ['mostly the address', 'edda.marlow@lantern-wharf.test', 'your own address or name'],
  ])('refuses a password that is %s', async (_what, password, says) => {
    const email = 'edda.marlow@lantern-wharf.test';
    const { body } = await house.request.post('/api/sign-up').send(signUpOf({ password, email })).expect(422);
    expect(body.errors).toEqual([{ path: 'password', message: expect.stringContaining(says) }]);
    expect(await Account.query().where({ email })).toEqual([]);
  });

  it.each([
    'correct horse battery staple',
    'zzzz yyyy xxxx w',
    'ровно двенадцать слов',
    '🏛️🌉🏙️🌃🌆🌇🏗️🏘️🏚️🏠🏡🏢',
    'x'.repeat(4) + ' no rules but length '.repeat(5),
  ])('takes %s: no rule but length and rarity', async (password) => {
    await makeOwner({ password });
  });

  it('names every wrong field at once', async () => {
    const { body } = await house.request
      .post('/api/sign-up')
      .send({ studioName: ' ', name: 'a\r\nBcc: b@c.test', email: 'no', password: 'x' })
      .expect(422);
    expect(body.errors.map((error: { path: string }) => error.path).sort()).toEqual(['email', 'name', 'password', 'studioName']);
  });
});

describe('signing in', () => {
  it('answers an unknown address, a guest and a wrong password alike', async () => {
    const { input } = await makeOwner();
    const guest = await makeAccount({ email: 'only-guest@example.test' });
    const answers = await Promise.all(
      [
        { email: 'nobody-at-all@example.test', password: PASSWORD },
        { email: guest.email, password: PASSWORD },
        { email: input.email, password: 'not the one it has' },
      ].map((tried) => house.request.post('/api/sign-in').send(tried)),
    );
    expect(new Set(answers.map((answer) => `${answer.status} ${JSON.stringify(answer.body)}`)).size).toBe(1);
    expect(answers[0]?.status).toBe(401);
    expect(answers.every((answer) => answer.headers['set-cookie'] === undefined)).toBe(true);
  });

  it('takes what was typed as it is: case and blanks count, the form of Unicode does not', async () => {
    const { input } = await makeOwner({ password: 'Café on the quay, 7 a.m. ' });
    const tries = { 'Cafe\u0301 on the quay, 7 a.m. ': 200, 'café on the quay, 7 a.m. ': 401, 'Café on the quay, 7 a.m.': 401 };
    for (const [password, status] of Object.entries(tries)) {
      await house.request.post('/api/sign-in').send({ email: input.email, password }).expect(status);
    }
  });

  it('gives a new token at every sign-in; the one before is dead', async () => {
    const { input, agent } = await makeOwner();
    const before = agent.jar.getCookie('oriel_studio', { path: '/', domain: '127.0.0.1', secure: false, script: false })?.value ?? '';
    await agent.post('/api/sign-in').send(input).expect(200);
    const after = agent.jar.getCookie('oriel_studio', { path: '/', domain: '127.0.0.1', secure: false, script: false })?.value ?? '';
    expect(before.length).toBeGreaterThan(20);
    expect(after).not.toBe(before);
    await house.request.get('/api/me').set('Cookie', `oriel_studio=${after}`).expect(200);
    const dead = await house.request.get('/api/me').set('Cookie', `oriel_studio=${before}`).expect(401);
    expect(dead.headers['set-cookie']?.[0]).toMatch(/^oriel_studio=;/);
  });

  it('signs out on the server too, here or everywhere', async () => {
    const { input, agent } = await makeOwner();
    const other = house.agent();
    await other.post('/api/sign-in').send(input).expect(200);
    const cookie = agent.jar.getCookie('oriel_studio', { path: '/', domain: '127.0.0.1', secure: false, script: false })?.value ?? '';
    await agent.post('/api/sign-out').expect(204);
    await house.request.get('/api/me').set('Cookie', `oriel_studio=${cookie}`).expect(401);
    await other.get('/api/me').expect(200);
    const third = house.agent();
    await third.post('/api/sign-in').send(input).expect(200);
    await third.post('/api/sign-out-everywhere').expect(204);
    await other.get('/api/me').expect(401);
    await third.get('/api/me').expect(401);
  });

  it('makes a hash of older settings anew while the password is at hand', async () => {
    const { input } = await makeOwner();
    const { hash } = await import('@node-rs/argon2');
    const older = await hash(PASSWORD, { memoryCost: 8192, timeCost: 1, parallelism: 1 });
    await Account.query().where({ email: input.email }).patch({ passwordHash: older });
    await house.request.post('/api/sign-in').send(input).expect(200);
    const { passwordHash } = await Account.query().findOne({ email: input.email }).throwIfNotFound();
    expect(passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    await house.request.post('/api/sign-in').send(input).expect(200);
  });

  it('tells somebody without a studio so, once their password is right', async () => {
    const account = await makeAccount({ email: 'left@example.test', passwordHash: await hashPassword(PASSWORD) });
    const { body } = await house.request.post('/api/sign-in').send({ email: account.email, password: PASSWORD }).expect(403);
    expect(body.code).toBe('no-studio');
    await house.request.post('/api/sign-in').send({ email: account.email, password: 'not this one, no' }).expect(401);
  });

  it('refuses requests that a page of another origin made', async () => {
    const { input } = await makeOwner();
    for (const headers of [{ origin: 'https://elsewhere.test' }, { 'sec-fetch-site': 'cross-site' }, { origin: 'null' }]) {
      const { body } = await house.request.post('/api/sign-in').set(headers).send(input).expect(403);
      expect(body.code).toBe('other-origin');
    }
    await house.request.post('/api/sign-in').set({ origin: house.address, 'sec-fetch-site': 'same-origin' }).send(input).expect(200);
  });
});

describe('a forgotten password', () => {
  it('is replaced by a link that works once, for an hour, and ends every session', async () => {
    const { input, agent } = await makeOwner();
    await house.request.post('/api/password-resets').send({ email: input.email }).expect(202);
    await house.request.post('/api/password-resets').send({ email: input.email }).expect(202);
    await house.runJobs();
    const [first = '', second = ''] = house.mails
      .mails()
      .filter((mail) => mail.subject === 'Choose a new password')
      .map((mail) => /reset-password\/([\w-]+)/.exec(mail.text)?.[1] ?? '');
    const row = await AccountToken.query().findOne({ purpose: 'reset-password', email: input.email }).throwIfNotFound();
    expect(row.expiresAt.getTime() - row.createdAt.getTime()).toBeLessThanOrEqual(60 * 60 * 1000 + 5000);
    const look = await house.request.post('/api/password-resets/look').send({ token: first }).expect(200);
    expect(look.body).toEqual({ email: input.email });
    await house.request.post('/api/password-resets/finish').send({ token: first, password: 'qwerty123456' }).expect(422);
    const next = 'slate roofs after the rain';
    await house.request.post('/api/password-resets/finish').send({ token: first, password: next }).expect(204);
    await agent.get('/api/me').expect(401);
    await house.request.post('/api/sign-in').send(input).expect(401);
    await house.request.post('/api/sign-in').send({ email: input.email, password: next }).expect(200);
    for (const token of [first, second]) {
      await house.request.post('/api/password-resets/finish').send({ token, password: 'another good set of words' }).expect(410);
    }
    await house.runJobs();
    expect(newestMail(house, input.email).subject).toBe('Your password was changed');
  });

  it('works once when used twice at the same moment', async () => {
    const { input } = await makeOwner();
    await house.request.post('/api/password-resets').send({ email: input.email });
    await house.runJobs();
    const token = tokenIn(house, input.email, 'reset-password');
    const answers = await Promise.all(
      ['one good set of words', 'another good set of words'].map((password) =>
        house.request.post('/api/password-resets/finish').send({ token, password }),
      ),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([204, 410]);
  });

  it('tells nobody whether an address is known, and mails no guest', async () => {
    const { input } = await makeOwner();
    const guest = await makeAccount({ email: 'guest-without@example.test' });
    house.mails.clear();
    const answers = [];
    for (const email of [input.email, guest.email, 'unknown@example.test']) {
      answers.push(await house.request.post('/api/password-resets').send({ email }).expect(202));
    }
    expect(new Set(answers.map((answer) => JSON.stringify(answer.body))).size).toBe(1);
    await house.runJobs();
    expect(house.mails.mails().map((mail) => mail.envelope.to)).toEqual([[input.email]]);
  });

  it('expires', async () => {
    const { input } = await makeOwner();
    await house.request.post('/api/password-resets').send({ email: input.email });
    await house.runJobs();
    const token = tokenIn(house, input.email, 'reset-password');
    await AccountToken.query()
      .where({ purpose: 'reset-password', email: input.email })
      .patch({ expiresAt: new Date(Date.now() - 1) });
    const { body } = await house.request.post('/api/password-resets/finish').send({ token, password: PASSWORD }).expect(410);
    expect(body.code).toBe('link-expired');
    await house.request
      .post('/api/password-resets/look')
      .send({ token: `${token.slice(0, -1)}_` })
      .expect(404);
  });
});

describe('the own account', () => {
  it('changes the password with the present one, and signs the other browsers out', async () => {
    const { input, agent } = await makeOwner();
    const other = house.agent();
    await other.post('/api/sign-in').send(input).expect(200);
    const password = 'seven bridges, one of them blue';
    const wrong = await agent.put('/api/me/password').send({ current: 'not it at all', password }).expect(422);
    expect(wrong.body.errors[0].path).toBe('current');
    await agent.put('/api/me/password').send({ current: PASSWORD, password }).expect(204);
    await agent.get('/api/me').expect(200);
    await other.get('/api/me').expect(401);
    await house.request.post('/api/sign-in').send({ email: input.email, password }).expect(200);
  });

  it('changes what is named and leaves the rest', async () => {
    const { owner } = await makeStudio(house);
    const { body } = await owner.agent.patch('/api/me').send({ shortcuts: false }).expect(200);
    expect(body.account).toMatchObject({ name: 'Ines Okafor', shortcuts: false });
    await owner.agent.patch('/api/me').send({ name: '' }).expect(422);
  });

  it('keeps no token that opens anything in the tables', async () => {
    const { input, agent } = await makeOwner();
    const cookie = agent.jar.getCookie('oriel_studio', { path: '/', domain: '127.0.0.1', secure: false, script: false })?.value ?? '';
    await house.request.post('/api/password-resets').send({ email: input.email });
    await house.runJobs();
    const token = tokenIn(house, input.email, 'reset-password');
    const everything = await house.ctx.knex.raw(
      `select string_agg(t::text, ' ') as text from (select row_to_json(s)::text as t from sessions s
         union all select row_to_json(a)::text from account_tokens a union all select row_to_json(m)::text from mails m) x`,
    );
    const text = (everything as { rows: { text: string }[] }).rows[0]?.text ?? '';
    expect(text).toContain(input.email);
    expect(text).not.toContain(cookie);
    expect(text).not.toContain(token);
  });

  it('is for nobody who is not signed in', async () => {
    await house.request.get('/api/me').expect(401);
    await house.request.get('/api/me').set('Cookie', 'oriel_studio=AAAAAAAAAAAAAAAAAAAAAAAAAAA').expect(401);
    await house.request.get('/api/me').set('Cookie', 'oriel_studio=%00; oriel_studio=x').expect(401);
  });
});
