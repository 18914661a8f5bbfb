import { Account } from '../../../api/models/Account.ts';
import { Membership } from '../../../api/models/Membership.ts';
import { Studio } from '../../../api/models/Studio.ts';
import type { StaffActor } from '../../../api/middleware/actor.ts';
import type { House } from '../house.ts';
import { openSession, type SignedIn } from '../session.ts';

/** Somebody of a studio, signed in; `actor` is what actions take. */
export interface StaffPerson extends SignedIn {
  account: Account;
  actor: StaffActor;
}

export interface MadeStudio {
  studio: Studio;
  owner: StaffPerson;
  assistant: StaffPerson;
}

/** A guest, signed in by a link's session. */
export interface GuestPerson extends SignedIn {
  account: Account;
}

let counter = 0;

/** An account with a confirmed address of its own and no password. */
export async function makeAccount(
  values: Partial<Pick<Account, 'email' | 'name' | 'passwordHash' | 'emailConfirmedAt'>> = {},
): Promise<Account> {
  counter += 1;
  const name = values.name ?? `Person ${counter}`;
  return Account.query().insertAndFetch({
    email: `person-${counter}@example.test`,
    emailConfirmedAt: new Date(),
    ...values,
    name,
  });
}

/** A studio with its owner and one assistant, both signed in. */
export async function makeStudio(
  house: House,
  values: Partial<Pick<Studio, 'name' | 'replyTo' | 'timeZone' | 'currency' | 'watermark'>> & {
    ownerName?: string;
    assistantName?: string;
  } = {},
): Promise<MadeStudio> {
  const { ownerName = 'Ines Okafor', assistantName = 'Petra Thorn', ...columns } = values;
  const studio = await Studio.query().insertAndFetch({
    name: 'Harrow Lane Studio',
    replyTo: 'studio@harrow-lane.test',
    watermark: { kind: 'text', text: 'Harrow Lane Studio', opacity: 0.35, size: 0.5, tiled: false },
    ...columns,
  });
  const [owner, assistant] = [await join(house, studio, 'owner', ownerName), await join(house, studio, 'assistant', assistantName)];
  return { studio, owner, assistant };
}

async function join(house: House, studio: Studio, role: 'owner' | 'assistant', name: string): Promise<StaffPerson> {
  const account = await makeAccount({ name });
  await Membership.query().insert({ studioId: studio.id, accountId: account.id, role });
  const signedIn = await openSession(house, account.id, 'staff');
  const actor: StaffActor = {
    kind: 'staff',
    accountId: account.id,
    studioId: studio.id,
    role,
    name,
    email: account.email,
    sessionId: 'of-the-factory',
  };
  return { ...signedIn, account, actor };
}

/** Signs a guest in; without an account a new one is made. What they may see is decided by their invitations. */
export async function makeGuestAgent(house: House, account?: Account): Promise<GuestPerson> {
  const guest = account ?? (await makeAccount());
  return { account: guest, ...(await openSession(house, guest.id, 'guest')) };
}
