import type { Knex } from 'knex';
import type { ClientPage, ListClients } from '../../contract/clients.ts';
import { containing } from '../../db/like.ts';
import { keyOf, pageOf } from '../../db/page.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { behindCursor } from '../../middleware/forged-cursor.ts';
import { type ClientLine, presentClientLine } from './presenter.ts';

/** A page of the studio's clients by name. */
export async function listClients(db: Knex, actor: StaffActor, { search, after, limit }: ListClients): Promise<ClientPage> {
  const conditions = ['cl.studio_id = ?', 'cl.deleted_at is null'];
  const bindings: (string | number)[] = [actor.studioId];
  if (search) {
    conditions.push(
      `(cl.name ilike ? or exists (select from contacts k where k.client_id = cl.id and (k.name ilike ? or k.email ilike ?)))`,
    );
    bindings.push(containing(search), containing(search), containing(search));
  }
  const key = keyOf(after, 2);
  if (key) {
    conditions.push('(lower(cl.name), cl.id) > (?, ?::uuid)');
    bindings.push(String(key[0]), String(key[1]));
  }
  const question = db.raw<{ rows: (ClientLine & { sortName: string })[] }>(
    `select cl.id, cl.name, cl.deleted_at, lower(cl.name) as sort_name,
       (select count(*)::int from contacts k where k.client_id = cl.id) as contact_count,
       (select k.name from contacts k where k.client_id = cl.id order by k.created_at, k.id limit 1) as first_contact,
       (select count(*)::int from commissions c where c.studio_id = cl.studio_id and c.client_id = cl.id and c.deleted_at is null) as commission_count
     from clients cl where ${conditions.join(' and ')} order by lower(cl.name), cl.id limit ?`,
    [...bindings, limit + 1],
  );
  const { rows } = await behindCursor(question);
  const page = pageOf(rows, limit, (row) => [row.sortName, row.id]);
  return { items: page.items.map(presentClientLine), next: page.next };
}
