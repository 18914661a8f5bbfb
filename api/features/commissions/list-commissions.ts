import type { Knex } from 'knex';
import type { CommissionPage, ListCommissions } from '../../contract/commissions.ts';
import { containing } from '../../db/like.ts';
import { keyOf, pageOf } from '../../db/page.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { behindCursor } from '../../middleware/forged-cursor.ts';
import { problem } from '../../middleware/problem.ts';
import { COMMISSION_FACTS } from './commission-facts.ts';
import { type CommissionLine, presentCommissionLine } from './presenter.ts';

type Binding = string | number;
interface Condition {
  sql: string;
  bindings: Binding[];
}

/** How each order sorts, and what comes after a row of it. Times go through text, since a Date would drop the microseconds. */
const ORDERS: Record<ListCommissions['sort'], { by: string; key: string; after: (key: string | null, id: string) => Condition }> = {
  newest: {
    by: 'c.created_at desc, c.id',
    key: 'c.created_at::text',
    after: (key, id) => ({
      sql: '(c.created_at < ?::timestamptz or (c.created_at = ?::timestamptz and c.id > ?::uuid))',
      bindings: [key ?? '', key ?? '', id],
    }),
  },
  due: {
    by: 'c.due_on, c.id',
    key: 'c.due_on::text',
    // Without a due date a commission comes last, as PostgreSQL sorts null.
    after: (key, id) =>
      key === null
        ? { sql: '(c.due_on is null and c.id > ?::uuid)', bindings: [id] }
        : { sql: '((c.due_on, c.id) > (?::date, ?::uuid) or c.due_on is null)', bindings: [key, id] },
  },
  title: {
    by: 'lower(c.title), c.id',
    key: 'lower(c.title)',
    after: (key, id) => ({ sql: '(lower(c.title), c.id) > (?, ?::uuid)', bindings: [key ?? '', id] }),
  },
};

function conditionsOf(actor: StaffActor, input: ListCommissions): Condition[] {
  const deleted = input.deleted === 'true';
  const conditions: Condition[] = [
    { sql: 'c.studio_id = ?', bindings: [actor.studioId] },
    { sql: deleted ? 'c.deleted_at is not null' : 'c.deleted_at is null', bindings: [] },
  ];
  if (input.search) {
    const pattern = containing(input.search);
    conditions.push({ sql: '(c.title ilike ? or cl.name ilike ?)', bindings: [pattern, pattern] });
  }
  if (input.clientId) conditions.push({ sql: 'c.client_id = ?', bindings: [input.clientId] });
  if (input.state) conditions.push({ sql: 'facts.state = ?', bindings: [input.state] });
  const key = keyOf(input.after, 2);
  if (key) conditions.push(ORDERS[input.sort].after(key[0] === null ? null : String(key[0]), String(key[1])));
  return conditions;
}

/** A page of the studio's commissions. Deleted ones are shown to the owner, who may bring them back. */
export async function listCommissions(db: Knex, actor: StaffActor, input: ListCommissions): Promise<CommissionPage> {
  if (input.deleted === 'true' && actor.role !== 'owner') throw problem(403, 'Only the owner sees deleted commissions.');
  const conditions = conditionsOf(actor, input);
  const { by, key } = ORDERS[input.sort];
  const question = db.raw<{ rows: (CommissionLine & { sortKey: string | null })[] }>(
    `select c.id, c.title, c.client_id, cl.name as client_name, c.shot_on, c.due_on, c.created_at, c.deleted_at, ${key} as sort_key,
       facts.state, facts.picks, facts.finals,
       (select count(*)::int from frames f where f.commission_id = c.id and f.deleted_at is null) as frames
     from commissions c join clients cl on cl.id = c.client_id ${COMMISSION_FACTS}
     where ${conditions.map(({ sql }) => sql).join(' and ')}
     order by ${by} limit ?`,
    [...conditions.flatMap(({ bindings }) => bindings), input.limit + 1],
  );
  const { rows } = await behindCursor(question);
  const page = pageOf(rows, input.limit, (row) => [row.sortKey, row.id]);
  return { items: page.items.map(presentCommissionLine), next: page.next };
}
