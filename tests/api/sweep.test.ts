import type supertest from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { everyOperation, openApiDocument } from '../../api/contract/openapi.ts';
import type { Operation, Who } from '../../api/contract/operation.ts';
import { exampleBody } from '../support/example-body.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type FullLife, makeFullLife } from '../support/full-life.ts';
import { startHouse, type House } from '../support/house.ts';

/**
 * Every operation of the description, called by everybody who may not. An operation that is new in the contract is swept without
 * a line here; one about a new kind of row needs a table of its plural name or a line in full-life.ts.
 */
type Agent = ReturnType<typeof supertest.agent>;

let house: House;
let home: MadeStudio;
let away: MadeStudio;
/** What is asked for; another commission of the same studio; one of another studio. */
let here: FullLife;
let beside: FullLife;
let there: FullLife;

beforeAll(async () => {
  house = await startHouse();
  home = await makeStudio(house);
  away = await makeStudio(house, { name: 'Quay Street Pictures' });
  here = await makeFullLife(house, home);
  beside = await makeFullLife(house, home);
  there = await makeFullLife(house, away);
});
afterAll(async () => {
  expect(house.logged, 'what the log got at error level').toEqual([]);
  await house.stop();
});

const document = openApiDocument('http://127.0.0.1');
const operations = everyOperation().filter(({ path }) => path.startsWith('/api/'));
const named = (some: Operation[]) => some.map((operation) => [`${operation.method} ${operation.path}`, operation] as const);
const parameters = ({ path }: Operation) => [...path.matchAll(/\{(\w+)\}/g)].map(([, name = '']) => name);
const forWhom = (...who: Who[]) => operations.filter((operation) => who.includes(operation.who));

const STUDIO: Who[] = ['staff', 'owner'];
const GUESTS: Who[] = ['guest', 'looker', 'guest-of-sheet', 'lead', 'recipient'];

/** The id of a row that full-life.ts does not know, from the table that is called like it. */
async function idOf(name: string, life: FullLife, studioId: string): Promise<string> {
  const known = life.ids[name];
  if (known) return known;
  const table = `${name.replace(/Id$/, '')}s`;
  const row = await house.ctx.knex(table).where({ studioId }).first('id');
  if (!row) throw new Error(`The full life has no {${name}}: build one in tests/support/full-life.ts.`);
  return row.id as string;
}

async function call(agent: Agent, operation: Operation, life: FullLife, studioId: string, last?: FullLife, wrongBody?: object) {
  let path = operation.path;
  const names = parameters(operation);
  const lastId = names.findLast((name) => name.endsWith('Id'));
  for (const name of names) path = path.replace(`{${name}}`, await idOf(name, name === lastId && last ? last : life, studioId));
  const request = agent[operation.method](path).set(operation.ifMatch ? { 'If-Match': '"1"' } : {});
  return operation.method === 'get' ? request : request.send(wrongBody ?? bodyFor(operation, last ?? life));
}

/** A body that the contract takes, so that what refuses is not the body. */
function bodyFor({ body }: Operation, life: FullLife): object {
  return body ? (exampleBody(body, life.ids) as object) : {};
}

const REFUSED = [401, 403, 404];

describe('nobody', () => {
  it.each(named(operations.filter(({ who }) => who !== 'anyone')))('%s asks who it is', async (_name, operation) => {
    expect((await call(house.agent(), operation, here, home.studio.id)).status).toBe(401);
  });

  it.each(named(forWhom('anyone')))('%s never breaks', async (_name, operation) => {
    expect((await call(house.agent(), operation, here, home.studio.id)).status).toBeLessThan(500);
  });
});

describe('the owner of another studio', () => {
  it.each(named(forWhom(...STUDIO).filter((operation) => parameters(operation).length > 0)))(
    '%s finds nothing',
    async (_name, operation) => {
      expect((await call(away.owner.agent, operation, here, home.studio.id)).status).toBe(404);
    },
  );

  it.each(named(forWhom(...GUESTS)))('%s is no guest', async (_name, operation) => {
    expect((await call(away.owner.agent, operation, here, home.studio.id)).status).toBe(401);
  });

  it.each(named(forWhom(...STUDIO).filter((operation) => operation.method === 'get' && parameters(operation).length === 0)))(
    '%s shows nothing of this studio',
    async (_name, operation) => {
      const { text } = await call(away.owner.agent, operation, here, home.studio.id);
      for (const [name, id] of Object.entries(here.ids)) if (name.endsWith('Id')) expect(text).not.toContain(id);
      expect(text).not.toContain(home.studio.id);
    },
  );
});

describe('somebody of the studio', () => {
  const nested = forWhom(...STUDIO).filter((operation) => parameters(operation).filter((name) => name.endsWith('Id')).length > 1);

  it.each(named(nested))('%s does not reach what hangs elsewhere through what is its own', async (_name, operation) => {
    expect((await call(home.owner.agent, operation, here, home.studio.id, beside)).status, 'of another commission').toBe(404);
    expect((await call(home.owner.agent, operation, here, home.studio.id, there)).status, 'of another studio').toBe(404);
  });

  it.each(named(forWhom('owner')))('as an assistant, %s is the owner’s', async (_name, operation) => {
    expect((await call(home.assistant.agent, operation, here, home.studio.id)).status).toBe(403);
  });
});

describe('a guest', () => {
  const ofSheet = forWhom('looker', 'guest-of-sheet', 'lead');

  it.each(named(forWhom(...STUDIO)))('%s is not for guests', async (_name, operation) => {
    expect((await call(here.lead.agent, operation, here, home.studio.id)).status).toBe(401);
  });

  it.each(named([...ofSheet, ...forWhom('recipient')]))('of another sheet, %s finds nothing', async (_name, operation) => {
    for (const stranger of [beside.lead, there.lead, beside.recipient, there.recipient]) {
      expect((await call(stranger.agent, operation, here, home.studio.id)).status).toBe(404);
    }
  });

  it.each(named(forWhom('lead')))('as a reviewer, %s is the lead’s', async (_name, operation) => {
    expect((await call(here.reviewer.agent, operation, here, home.studio.id)).status).toBe(403);
  });

  it.each(named(forWhom('recipient')))('as the lead of the sheet, %s is the recipients’', async (_name, operation) => {
    expect((await call(here.lead.agent, operation, here, home.studio.id)).status).toBe(404);
  });

  const nested = [...ofSheet, ...forWhom('recipient')].filter(
    (operation) => parameters(operation).filter((name) => name.endsWith('Id')).length > 1,
  );
  it.each(named(nested))('%s does not reach what hangs elsewhere through what is their own', async (_name, operation) => {
    const agent = operation.who === 'recipient' ? here.recipient.agent : here.lead.agent;
    for (const elsewhere of [beside, there]) {
      expect(REFUSED).toContain((await call(agent, operation, here, home.studio.id, elsewhere)).status);
    }
  });
});

describe('somebody who looks by the open link', () => {
  const others = operations.filter(({ who }) => who !== 'anyone' && who !== 'looker');
  const below = ({ path }: Operation) => path.startsWith('/api/guest/sheets/{sheetId}');

  it.each(named(forWhom('looker')))('%s is open to them', async (_name, operation) => {
    if (operation.answer === 'text/event-stream') return;
    const response = await call(here.looker, operation, here, home.studio.id);
    expect(response.status, response.text).toBe(operation.status ?? 200);
  });

  it.each(named(forWhom('looker')))('of another sheet, %s asks who it is', async (_name, operation) => {
    for (const stranger of [beside.looker, there.looker]) {
      expect((await call(stranger, operation, here, home.studio.id)).status).toBe(401);
    }
  });

  it.each(named(others.filter((operation) => !below(operation))))('%s asks who it is', async (_name, operation) => {
    expect((await call(here.looker, operation, here, home.studio.id)).status).toBe(401);
  });

  it.each(named(others.filter(below)))('%s says how to come to it', async (_name, operation) => {
    const response = await call(here.looker, operation, here, home.studio.id);
    expect(response.status).toBe(403);
    expect(response.body.detail).toContain('give your name and confirm your e-mail address');
  });

  it('changes nothing but to ask for a place', () => {
    const changing = forWhom('looker').filter(({ method }) => method !== 'get');
    expect(changing.map(({ path }) => path)).toEqual(['/api/guest/sheets/{sheetId}/ask-to-mark']);
  });
});

describe('who may', () => {
  const rightful = (who: Who): Agent => {
    if (who === 'owner') return home.owner.agent;
    if (who === 'recipient') return here.recipient.agent;
    return STUDIO.includes(who) ? home.assistant.agent : here.lead.agent;
  };
  const reads = operations.filter(({ method, answer, who }) => method === 'get' && answer !== 'text/event-stream' && who !== 'anyone');

  it.each(named(reads))('%s is answered as the contract says', async (_name, operation) => {
    const response = await call(rightful(operation.who), operation, here, home.studio.id);
    expect(response.status, response.text).toBe(operation.status ?? 200);
    if (!(operation.answer instanceof z.ZodType)) return;
    const read = operation.answer.safeParse(response.body);
    expect(read.success ? [] : read.error.issues).toEqual([]);
    expect(response.body).toEqual(read.data);
  });

  it.each(named(operations.filter(({ method, body, who }) => method !== 'get' && body && who !== 'anyone')))(
    '%s takes nothing that is not filled in, and does not break',
    async (_name, operation) => {
      const schema = operation.body as z.ZodType;
      const wrong = { title: 7, name: 7, words: 7, unknown: '\u0000' };
      if (schema.safeParse(wrong).success) return;
      const response = await call(rightful(operation.who), operation, here, home.studio.id, undefined, wrong);
      expect(response.status, response.text).toBe(422);
      expect(response.body).toMatchObject({ status: 422, detail: expect.any(String) });
    },
  );
});

describe('while a commission is deleted', () => {
  let gone: FullLife;
  beforeAll(async () => {
    gone = await makeFullLife(house, home);
    await house.ctx.knex('commissions').where({ id: gone.ids.commissionId }).update({ deletedAt: new Date() });
  });
  /** Rows that belong to the studio and not to a commission, and the way back. */
  const stays = /\{(clientId|mailId|invitationId|accountId)\}|\/\{commissionId\}\/restore$/;
  const within = operations.filter(({ path, who }) => who !== 'anyone' && path.includes('{') && !stays.test(path));

  it.each(named(within))('%s finds nothing of it', async (_name, operation) => {
    const agent = STUDIO.includes(operation.who)
      ? home.owner.agent
      : operation.who === 'recipient'
        ? gone.recipient.agent
        : gone.lead.agent;
    expect((await call(agent, operation, gone, home.studio.id)).status).toBe(404);
  });
});

it('sweeps what the description says', () => {
  const described = Object.entries(document.paths).flatMap(([path, methods]) => Object.keys(methods).map((method) => `${method} ${path}`));
  expect(operations.length).toBeGreaterThan(100);
  expect(operations.every(({ method, path }) => described.includes(`${method} ${path}`))).toBe(true);
});
