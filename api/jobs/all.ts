import { dropMerged } from '../features/brackets/drop-merged.job.ts';
import { groupFrames } from '../features/brackets/group-frames.job.ts';
import { mergeBracket } from '../features/brackets/merge-bracket.job.ts';
import { measureFrame } from '../features/frames/measure-frame.job.ts';
import { measureOlder } from '../features/frames/measure-older.job.ts';
import { purgeClients } from '../features/clients/purge-clients.job.ts';
import { purgeCommissions } from '../features/commissions/purge-commissions.job.ts';
import { findUnsureMails } from '../features/mail/find-unsure-mails.job.ts';
import { sendMail } from '../features/mail/send-mail.job.ts';
import { watermarkProofs } from '../features/sheets/watermark-proofs.job.ts';
import { purgeFrames } from '../features/frames/purge-frames.job.ts';
import { cleanUploads } from '../features/uploads/clean-uploads.job.ts';
import { dropTwin } from '../features/uploads/drop-twin.job.ts';
import { dropUpload } from '../features/uploads/drop-upload.job.ts';
import { noteFrames } from '../features/uploads/note-frames.job.ts';
import { takeInUpload } from '../features/uploads/take-in-upload.job.ts';
import { sweepAccounts } from '../features/sign-in/sweep-accounts.job.ts';
import { buildArchive } from '../features/archives/build-archive.job.ts';
import { findStrandedArchives } from '../features/archives/find-stranded-archives.job.ts';
import { sendDelivery } from '../features/deliveries/send-delivery.job.ts';
import { makeFinalPictures } from '../features/finals/make-final-pictures.job.ts';
import { sweepFinals } from '../features/finals/sweep-finals.job.ts';
import type { Job } from './job.ts';

/** Every job the worker knows. */
export const jobs: Job<never>[] = [
  takeInUpload,
  dropUpload,
  dropTwin,
  noteFrames,
  cleanUploads,
  measureFrame,
  measureOlder,
  groupFrames,
  mergeBracket,
  dropMerged,
  purgeFrames,
  watermarkProofs,
  sendMail,
  findUnsureMails,
  sweepAccounts,
  purgeClients,
  purgeCommissions,
  makeFinalPictures,
  buildArchive,
  sendDelivery,
  findStrandedArchives,
  sweepFinals,
];
