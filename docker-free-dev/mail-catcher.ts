import fs from 'node:fs';
import path from 'node:path';
import { claimFolder } from './folder-owner.ts';
import { type CaughtMail, Mailbox } from './mail-catcher/mailbox.ts';
import { startPage } from './mail-catcher/page-server.ts';
import { MailFaults, startSmtp } from './mail-catcher/smtp.ts';

export type { CaughtMail } from './mail-catcher/mailbox.ts';

export interface MailCatcherOptions {
  /** Mails are kept here and are there again after a restart. */
  dir: string;
  /** Loopback ports; free ones are taken where they are left out. */
  smtpPort?: number;
  pagePort?: number;
}

export interface RunningMailCatcher {
  smtpPort: number;
  pagePort: number;
  /** Where a person reads the mails. */
  pageAddress: string;
  /** Caught mails in the order they came. */
  mails(): CaughtMail[];
  clear(): void;
  faults: MailFaults;
  stop(): Promise<void>;
}

/** Starts an SMTP server that keeps every mail, and a page to read them on; both on 127.0.0.1. */
export async function startMailCatcher(options: MailCatcherOptions): Promise<RunningMailCatcher> {
  fs.mkdirSync(options.dir, { recursive: true, mode: 0o700 });
  const release = claimFolder(options.dir, 'The mail catcher');
  const faults = new MailFaults();
  const running: { stop(): Promise<void> }[] = [];
  const stop = async () => {
    await Promise.all(running.map((one) => one.stop()));
    release();
  };
  try {
    const mailbox = new Mailbox(path.join(options.dir, 'mails'));
    const smtp = await startSmtp(mailbox, faults, options.smtpPort ?? 0);
    running.push(smtp);
    const page = await startPage(mailbox, options.pagePort ?? 0);
    running.push(page);
    return {
      smtpPort: smtp.port,
      pagePort: page.port,
      pageAddress: `http://127.0.0.1:${page.port}/`,
      mails: () => mailbox.all(),
      clear: () => mailbox.clear(),
      faults,
      stop,
    };
  } catch (error) {
    await stop();
    throw error;
  }
}
