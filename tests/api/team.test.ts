import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { Account } from '../../api/models/Account.ts';
import { AccountToken } from '../../api/models/AccountToken.ts';
import { Membership } from '../../api/models/Membership.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { Studio } from '../../api/models/Studio.ts';
import { hashPassword } from '../../api/features/sign-in/passwords.ts';
import { type MadeStudio, makeAccount, makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';
import { newestMail, tokenIn } from '../support/mail-links.ts';

const PASSWORD = 'copper gutters drip at noon';
let house: House;
let made: MadeStudio;
beforeAll(async () => void (house = await startHouse()));
afterAll(() => house.stop());
beforeEach(async () => {
  house.mails.clear();
  made = await makeStudio(house);
});

let counter = 0;
async function invite(values: { email?: string; name?: string } = {}) {
  const email = values.email ?? `joseph-${(counter += 1)}@example.test`;
  const answer = await made.owner.agent.post('/api/team/invitations').send({ name: 'Joseph Quill', email, ...values });
  await house.runJobs();
  return { email, answer };
}

it('lists the owner first, and who was invited', async () => {
  const { answer, email } = await invite();
  expect(answer.status).toBe(201);
  expect(answer.body.members.map((member: { name: string; role: string }) => [member.name, member.role])).toEqual([
    ['Ines Okafor', 'owner'],
    ['Petra Thorn', 'assistant'],
  ]);
  expect(answer.body.members.map((member: { can: { remove: boolean } }) => member.can.remove)).toEqual([false, true]);
  expect(answer.body.invitations).toMatchObject([{ name: 'Joseph Quill', email, state: 'open' }]);
});

it('is the owner’s alone', async () => {
  const { agent } = made.assistant;
  await agent.get('/api/team').expect(403);
  await agent.post('/api/team/invitations').send({ name: 'A B', email: 'a@b.test' }).expect(403);
  await agent.delete(`/api/team/members/${made.owner.account.id}`).expect(403);
  await house.request.get('/api/team').expect(401);
});

it('lets an invited person choose a password and work at once', async () => {
  const { email } = await invite();
  expect(newestMail(house, email).subject).toBe('Ines Okafor invites you to Harrow Lane Studio');
  const token = tokenIn(house, email, 'join');
  const look = await house.request.post('/api/join/look').send({ token }).expect(200);
  expect(look.body).toEqual({ studioName: 'Harrow Lane Studio', email, name: 'Joseph Quill', password: 'new' });
  const weak = await house.request.post('/api/join').send({ token, name: 'Joseph Quill', password: 'short' }).expect(422);
  expect(weak.body.errors[0].path).toBe('password');
  const agent = house.agent();
  const me = await agent.post('/api/join').send({ token, name: 'Joseph R. Quill', password: PASSWORD }).expect(200);
  expect(me.body).toMatchObject({
    role: 'assistant',
    account: { name: 'Joseph R. Quill' },
    can: { team: false, money: false, leave: true },
  });
  await agent.get('/api/me').expect(200);
  await house.request.post('/api/join').send({ token, name: 'X', password: PASSWORD }).expect(410);
  await house.request.post('/api/sign-in').send({ email, password: PASSWORD }).expect(200);
});

it('asks somebody with a password for that one, and changes it for nobody', async () => {
  const account = await makeAccount({ email: 'former@example.test', passwordHash: await hashPassword(PASSWORD) });
  const { email } = await invite({ email: account.email });
  const token = tokenIn(house, email, 'join');
  expect((await house.request.post('/api/join/look').send({ token })).body.password).toBe('known');
  await house.request.post('/api/join').send({ token, name: 'F', password: 'a new one for the account' }).expect(422);
  await house.request.post('/api/join').send({ token, name: 'F', password: PASSWORD }).expect(200);
});

it('does not take somebody out of their studio, nor lets an unconfirmed sign-up with their address stand in the way', async () => {
  const other = await makeStudio(house, { name: 'Another Studio' });
  await Account.query()
    .findById(other.assistant.account.id)
    .patch({ passwordHash: await hashPassword(PASSWORD) });
  const { email } = await invite({ email: other.assistant.account.email });
  const token = tokenIn(house, email, 'join');
  const { body } = await house.request.post('/api/join').send({ token, name: 'P', password: PASSWORD }).expect(409);
  expect(body.code).toBe('has-studio');
  expect(await Membership.query().findOne({ accountId: other.assistant.account.id })).toMatchObject({ studioId: other.studio.id });

  await house.request
    .post('/api/sign-up')
    .send({ studioName: 'Squatted', name: 'Not Joseph', email: 'squatted@example.test', password: 'words of a stranger, many' })
    .expect(202);
  await invite({ email: 'squatted@example.test' });
  const joined = await house.request
    .post('/api/join')
    .send({ token: tokenIn(house, 'squatted@example.test', 'join'), name: 'Joseph', password: PASSWORD })
    .expect(200);
  expect(joined.body).toMatchObject({ role: 'assistant', studio: { name: 'Harrow Lane Studio' } });
  expect(await Studio.query().where({ name: 'Squatted' })).toEqual([]);
  await house.request.post('/api/sign-in').send({ email: 'squatted@example.test', password: 'words of a stranger, many' }).expect(401);
});

it('sends an invitation again under a new link, and withdraws it', async () => {
  const { email, answer } = await invite();
  const first = tokenIn(house, email, 'join');
  const again = await made.owner.agent.post(`/api/team/invitations/${answer.body.invitations[0].id}/send-again`).expect(200);
  await house.runJobs();
  const second = tokenIn(house, email, 'join');
  expect(second).not.toBe(first);
  await house.request.post('/api/join/look').send({ token: first }).expect(404);
  await house.request.post('/api/join/look').send({ token: second }).expect(200);
  expect(again.body.invitations).toHaveLength(1);
  const gone = await made.owner.agent.delete(`/api/team/invitations/${again.body.invitations[0].id}`).expect(200);
  expect(gone.body.invitations).toEqual([]);
  await house.request.post('/api/join').send({ token: second, name: 'J', password: PASSWORD }).expect(404);
  await made.owner.agent.delete(`/api/team/invitations/${again.body.invitations[0].id}`).expect(404);
});

it('keeps one invitation an address, also when two come at once, and refuses who works here', async () => {
  const body = { name: 'Joseph Quill', email: 'twice@example.test' };
  await Promise.all([1, 2, 3].map(() => made.owner.agent.post('/api/team/invitations').send(body).expect(201)));
  expect(await AccountToken.query().where({ studioId: made.studio.id, email: body.email })).toHaveLength(1);
  const { answer } = await invite({ email: made.assistant.account.email });
  expect(answer.body.errors).toEqual([{ path: 'email', message: 'This person works here already.' }]);
});

it('ends an invitation after seven days', async () => {
  const { email } = await invite();
  const row = await AccountToken.query().findOne({ studioId: made.studio.id, email }).throwIfNotFound();
  expect(Math.round((row.expiresAt.getTime() - row.createdAt.getTime()) / 3_600_000)).toBe(7 * 24);
  await AccountToken.query()
    .findById(row.id)
    .patch({ expiresAt: new Date(Date.now() - 1) });
  const { body } = await house.request
    .post('/api/join/look')
    .send({ token: tokenIn(house, email, 'join') })
    .expect(410);
  expect(body.code).toBe('link-expired');
  expect((await made.owner.agent.get('/api/team')).body.invitations[0].state).toBe('expired');
});

it('removes an assistant, whose sessions end in the same moment', async () => {
  await made.assistant.agent.get('/api/me').expect(200);
  const { body } = await made.owner.agent.delete(`/api/team/members/${made.assistant.account.id}`).expect(200);
  expect(body.members).toHaveLength(1);
  await made.assistant.agent.get('/api/me').expect(401);
  expect(await house.ctx.knex('sessions').where({ userId: made.assistant.account.id })).toEqual([]);
  await made.owner.agent.delete(`/api/team/members/${made.assistant.account.id}`).expect(404);
  const line = await RecordEntry.query().findOne({ studioId: made.studio.id, did: 'team.removed' });
  expect(line).toMatchObject({ byName: 'Ines Okafor', says: 'Removed Petra Thorn from the team' });
});

it('keeps the owner, and the people of other studios', async () => {
  const other = await makeStudio(house);
  await made.owner.agent.delete(`/api/team/members/${made.owner.account.id}`).expect(404);
  await made.owner.agent.delete(`/api/team/members/${other.assistant.account.id}`).expect(404);
  await other.assistant.agent.get('/api/me').expect(200);
  await made.owner.agent.post('/api/team/leave').expect(409);
  const { answer } = await invite();
  await other.owner.agent.delete(`/api/team/invitations/${answer.body.invitations[0].id}`).expect(404);
});

it('lets an assistant leave', async () => {
  await made.assistant.agent.post('/api/team/leave').expect(204);
  await made.assistant.agent.get('/api/me').expect(401);
  expect((await made.owner.agent.get('/api/team')).body.members).toHaveLength(1);
});
