import type { Transaction } from 'objection';
import { Membership } from '../../models/Membership.ts';
import { Studio } from '../../models/Studio.ts';
import { addToRecord } from '../record/add-to-record.ts';

export interface NewStudio {
  name: string;
  /** Where answers to its mails go: the owner's address until the settings say otherwise. */
  replyTo: string;
  owner: { id: string; name: string };
  timeZone?: string | undefined;
  currency?: string | undefined;
}

/** Makes a studio and its owner's membership, within the transaction that made, or found, the owner's account. */
export async function createStudio(trx: Transaction, { name, replyTo, owner, timeZone, currency }: NewStudio): Promise<Studio> {
  const studio = await Studio.query(trx).insertAndFetch({
    name,
    replyTo,
    ...(timeZone ? { timeZone } : {}),
    ...(currency ? { currency } : {}),
    watermark: { kind: 'text', text: name, opacity: 0.35, size: 0.5, tiled: false },
  });
  await Membership.query(trx).insert({ studioId: studio.id, accountId: owner.id, role: 'owner' });
  await addToRecord(trx, {
    studioId: studio.id,
    actor: { kind: 'staff', accountId: owner.id, name: owner.name },
    did: 'studio.created',
    says: `Signed up ${name}`,
  });
  return studio;
}
