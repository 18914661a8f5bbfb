import sharp from 'sharp';
import workerpool from 'workerpool';
import { tasks } from './tasks.ts';

// The pool that starts this process divides the cores and says how many threads are this one's.
sharp.concurrency(Number(process.argv[2] ?? 1));
// No file is opened twice here, so nothing of it is kept.
sharp.cache(false);

workerpool.worker(tasks);
