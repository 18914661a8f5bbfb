import * as brackets from './brackets.ts';
import * as checks from './checks.ts';
import * as clients from './clients.ts';
import * as commissions from './commissions.ts';
import * as deliveries from './deliveries.ts';
import * as desk from './desk.ts';
import * as docs from './docs.ts';
import * as finals from './finals.ts';
import * as frames from './frames.ts';
import * as guestSheets from './guest-sheets.ts';
import * as guests from './guests.ts';
import * as mail from './mail.ts';
import * as openLinks from './open-links.ts';
import type { Operation } from './operation.ts';
import * as pickLists from './pick-lists.ts';
import * as problem from './problem.ts';
import * as record from './record.ts';
import * as sheets from './sheets.ts';
import * as signIn from './sign-in.ts';
import * as studioOpenLink from './studio-open-link.ts';
import * as studios from './studios.ts';
import * as team from './team.ts';
import * as uploads from './uploads.ts';
import * as uses from './uses.ts';
import * as watermark from './watermark.ts';

/** Everything a file of the contract exports: schemas under their names, and lists of operations. */
export type ContractModule = Record<string, unknown>;

/** A noun of the API and where its contract stands. */
export interface Section {
  name: string;
  module: ContractModule;
}

/** The whole contract, in the order it is read. A file that is named here is described, documented and swept without a further line. */
export const sections: readonly Section[] = [
  { name: 'Signing in', module: signIn },
  { name: 'Studio', module: { ...studios, ...checks, ...uses } },
  { name: 'Team', module: team },
  { name: 'Desk', module: desk },
  { name: 'Clients', module: clients },
  { name: 'Commissions', module: commissions },
  { name: 'Uploads', module: uploads },
  { name: 'Frames', module: frames },
  { name: 'Brackets', module: brackets },
  { name: 'Proof sheets', module: sheets },
  { name: 'Watermark', module: watermark },
  { name: 'Pick lists', module: pickLists },
  { name: 'Finals', module: finals },
  { name: 'Deliveries', module: deliveries },
  { name: 'Record', module: record },
  { name: 'Mail', module: mail },
  { name: 'Guests', module: guests },
  { name: 'Guests’ sheets', module: guestSheets },
  { name: 'Open links', module: { ...openLinks, ...studioOpenLink } },
  { name: 'This description', module: { ...docs, ...problem } },
];

/** The operations of a section: every exported list whose name ends so. */
export function operationsOf({ module }: Section): Operation[] {
  return Object.entries(module).flatMap(([name, value]) => (name.endsWith('Operations') ? (value as Operation[]) : []));
}
