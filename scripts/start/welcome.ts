import type { Demo } from '../../seeds/demo.ts';
import { announce, say } from './say.ts';

export interface Welcome {
  address: string;
  mailsPage: string | null;
  dataDir: string;
  logDir: string;
  demo: Demo | null;
}

/** What a person needs after a start, on one screen. */
export function sayWelcome({ address, mailsPage, dataDir, logDir, demo }: Welcome): void {
  say('');
  announce(`Oriel is ready:    ${address}`);
  if (mailsPage) say(`Mails it sent:     ${mailsPage}`);
  for (const { who, email, password } of demo?.signIns ?? []) say(`Sign in as ${`${who}:`.padEnd(11)}${email}  ${password}`);
  if (demo?.proofingLink) say(`Proofing link:     ${new URL(demo.proofingLink, address).href}`);
  say(`Data and logs:     ${dataDir}, ${logDir}`);
  say('Ctrl-C stops all of it.');
}
