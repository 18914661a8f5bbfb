import fs from 'node:fs';
import { parseArgs } from 'node:util';
import { archive } from './archive.ts';
import type { Bench } from './figures.ts';
import { printTable } from './figures.ts';
import { fuse } from './fuse.ts';
import { ingest } from './ingest.ts';
import { marks } from './marks.ts';
import { page } from './page.ts';
import { sheet } from './sheet.ts';

process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = 'true';

const benches: Record<string, Bench> = { ingest, archive, sheet, marks, page, fuse };

const { values, positionals } = parseArgs({
  allowPositionals: true,
  options: { json: { type: 'string' }, rounds: { type: 'string', default: '5' } },
});
const [name = ''] = positionals;
const bench = benches[name];
if (!bench) {
  console.error(`npm run bench -- NAME [--json FILE] [--rounds N]\nNAME is one of: ${Object.keys(benches).join(', ')}`);
  process.exit(1);
}

// Ours and the reference run in turns within one run; what is printed are medians.
const figures = await bench(Math.max(1, Number(values.rounds)));
printTable(name, figures);
if (values.json) fs.writeFileSync(values.json, `${JSON.stringify({ name, figures }, null, 2)}\n`);
process.exit(0);
