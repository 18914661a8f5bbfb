/** One of several threads that run the same program over the same memory, each on rows of its own. */
export interface Share {
  index: number;
  count: number;
  /** Waits until every thread has come this far; what they wrote can be read then. */
  meet(): void;
}

/** The whole work, where there is one thread alone. */
export const ALONE: Share = { index: 0, count: 1, meet: () => undefined };

/** Fewer rows are not worth dividing. */
const MIN_ROWS = 32;

/** The rows of a level that are this thread's, from the first to before the last. */
export function rowsOf({ index, count }: Share, height: number): [from: number, to: number] {
  if (height < MIN_ROWS * count) return index === 0 ? [0, height] : [0, 0];
  return [Math.floor((height * index) / count), Math.floor((height * (index + 1)) / count)];
}

/**
 * A meeting place in shared memory for `count` threads, used again and again.
 * @param place Two numbers, 0 at first: how many have come, and how many meetings there were.
 */
export function meetingAt(place: Int32Array, count: number): () => void {
  return () => {
    const meeting = Atomics.load(place, 1);
    if (Atomics.add(place, 0, 1) + 1 === count) {
      Atomics.store(place, 0, 0);
      Atomics.add(place, 1, 1);
      Atomics.notify(place, 1);
      return;
    }
    while (Atomics.load(place, 1) === meeting) Atomics.wait(place, 1, meeting);
  };
}
