import { drawTake } from './draw-take.ts';
import { planFrames } from './frames.ts';

/** What the parent asks of a child: one take, by its number in the plan. */
export interface Order {
  take: number;
  dir: string;
  today: string;
  longSide: number;
}

export type Answer = { kind: 'frame'; name: string } | { kind: 'done' } | { kind: 'failed'; reason: string };

const tell = (answer: Answer): void => void process.send?.(answer);

process.on('message', (order: Order) => {
  const planned = planFrames(new Date(order.today), order.longSide)[order.take]!;
  drawTake(planned, order.dir, (name) => tell({ kind: 'frame', name })).then(
    () => tell({ kind: 'done' }),
    (error: unknown) => tell({ kind: 'failed', reason: error instanceof Error ? (error.stack ?? error.message) : String(error) }),
  );
});
// Without the parent nobody waits for pictures.
process.on('disconnect', () => process.exit(0));
