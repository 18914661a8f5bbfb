import { setTimeout as pause } from 'node:timers/promises';

/*
 * Asks the API for what pages ask for, some twenty times a second, in a process of its own: the bench that uploads has a busy loop itself, and
 * would count its own delays as those of the API. Told where to ask by its environment; answers with the milliseconds when it is told to stop.
 */
const routes = JSON.parse(process.env.BENCH_ROUTES ?? '[]') as string[];
const took: number[] = [];
let over = false;
process.once('message', () => (over = true));
for (let at = 0; !over; at += 1) {
  const begun = performance.now();
  const answer = await fetch(routes[at % routes.length] ?? '', { headers: { cookie: process.env.BENCH_COOKIE ?? '' } });
  await answer.arrayBuffer();
  took.push(performance.now() - begun);
  await pause(50);
}
process.send?.(took, () => process.exit(0));
