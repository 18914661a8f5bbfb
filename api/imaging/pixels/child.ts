import os from 'node:os';
import sharp from 'sharp';
import workerpool from 'workerpool';
import { tasks } from './tasks.ts';

// The pool that starts this process divides the cores and says how many threads are this one's.
sharp.concurrency(Number(process.argv[2] ?? 1));
// Pictures wait for people, not people for pictures.
os.setPriority(Number(process.argv[3] ?? 0));
// No file is opened twice here, so nothing of it is kept.
sharp.cache(false);

type Task = (...args: never[]) => unknown;

/** Says whose work it is before it begins, so that the parent can end it. */
function announced(task: Task): Task {
  return (...args) => {
    workerpool.workerEmit({ pid: process.pid });
    return task(...args);
  };
}

workerpool.worker(Object.fromEntries(Object.entries(tasks).map(([name, task]) => [name, announced(task as Task)])));
