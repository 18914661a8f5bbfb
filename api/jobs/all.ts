import { purgeClients } from '../features/clients/purge-clients.job.ts';
import { purgeCommissions } from '../features/commissions/purge-commissions.job.ts';
import { findUnsureMails } from '../features/mail/find-unsure-mails.job.ts';
import { sendMail } from '../features/mail/send-mail.job.ts';
import { watermarkProofs } from '../features/sheets/watermark-proofs.job.ts';
import type { Job } from './job.ts';

/** Every job the worker knows. */
export const jobs: Job<never>[] = [watermarkProofs, sendMail, findUnsureMails, purgeClients, purgeCommissions];
