import fs from 'node:fs';
import { pino } from 'pino';
import { loadConfig } from '../../api/config.ts';
import { openHouse } from '../../api/house.ts';
import { seedDemo } from '../../seeds/demo.ts';

/** Makes the demo and leaves what a person needs to look around in the file named on the command line. */
const [, , file, dir] = process.argv;
if (!file || !dir) throw new Error('Name the file for the sign-ins and the folder for the drawn pictures.');
const log = pino({ level: 'error' }, pino.destination(2));
const { ctx, close } = await openHouse(loadConfig(process.env), log);
try {
  const demo = await seedDemo(ctx, { dir, say: (line) => console.log(line) });
  fs.writeFileSync(file, JSON.stringify(demo, null, 2), { mode: 0o600 });
} finally {
  await close();
}
process.exit(0);
