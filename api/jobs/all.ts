import type { Job } from './job.ts';

/** Every job the worker knows. */
export const jobs: Job<never>[] = [];
