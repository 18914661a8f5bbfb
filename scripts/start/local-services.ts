import path from 'node:path';
import { startMailCatcher } from '../../docker-free-dev/mail-catcher.ts';
import { startStore } from '../../docker-free-dev/s3-store.ts';

/*
 * The local store and the mail catcher in a process of their own, so that neither shares a core's time with the
 * process that watches over all. What to start comes as JSON in the environment: secrets do not belong on a command
 * line, which every user of the machine can read.
 */

export interface LocalServices {
  store: {
    dir: string;
    port: number;
    accessKeyId: string;
    secretAccessKey: string;
    bucket: string;
    region: string;
    corsOrigins: string[];
  } | null;
  mails: { dir: string; smtpPort: number; pagePort: number } | null;
}

const { store, mails } = JSON.parse(process.env.ORIEL_LOCAL_SERVICES ?? '{}') as LocalServices;
const running: { stop(): Promise<void> }[] = [];
if (store) running.push(await startStore({ ...store, buckets: [store.bucket] }));
if (mails) running.push(await startMailCatcher({ ...mails, dir: path.resolve(mails.dir) }));
process.send?.('ready');

async function stop(): Promise<void> {
  await Promise.all(running.map((one) => one.stop()));
  process.exit(0);
}
process.on('SIGTERM', () => void stop());
process.on('disconnect', () => void stop());
