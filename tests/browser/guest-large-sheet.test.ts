import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Sheet } from '../../api/models/Sheet.ts';
import { drawPicture } from '../support/factories/frame.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio } from '../support/factories/studio.ts';
import { startSite, type Site } from './support.ts';

const MANY = 1000;
/** The weight of code that a guest's phone should bear. */
const HEAVIEST = 150_000;

let site: Site;
let open: Awaited<ReturnType<typeof makeOpenSheet>>;
let drawn: Buffer;

beforeAll(async () => {
  site = await startSite();
  open = await makeOpenSheet(site.house, await makeStudio(site.house), { proofs: 3, allowance: 12 });
  drawn = await drawPicture();
  await site.house.runJobs();
  await growTo(MANY);
});
afterAll(() => site?.stop());

/** Copies of the first frame and proof until the sheet has so many, every third upright; their pictures are answered by the test. */
async function growTo(count: number): Promise<void> {
  const { knex } = site.house.ctx;
  await knex.raw(
    `insert into frames select (jsonb_populate_record(f, jsonb_build_object('id', gen_random_uuid(), 'sha256', encode(sha256(n::text::bytea), 'hex'),
            'storage_key', f.storage_key || '-' || n, 'width', case when n % 3 = 0 then 4000 else 6000 end,
            'height', case when n % 3 = 0 then 6000 else 4000 end))).*
       from frames f, generate_series(4, :count) n where f.id = :frame`,
    { count, frame: open.frames[0]?.id ?? '' },
  );
  await knex.raw(
    `insert into proofs (studio_id, sheet_id, frame_id, view_id, number, position, watermark_hash)
     select p.studio_id, p.sheet_id, f.id, p.view_id, 3 + row_number() over (), 3 + row_number() over (), p.watermark_hash
       from proofs p join frames f on f.commission_id = :commission
      where p.sheet_id = :sheet and p.number = 3 and not exists (select from proofs o where o.frame_id = f.id)`,
    { commission: open.commission.id, sheet: open.sheet.id },
  );
  await Sheet.query().findById(open.sheet.id).increment('revision', 1);
}

interface Measured {
  shift: number;
}

describe('a sheet of 1,000 proofs', () => {
  it('moves nothing while it loads and scrolls, draws a screenful, and weighs less than 150 kB of code', async () => {
    const visitor = await site.visit('/healthz', { cookie: open.lead.cookie });
    const { page } = visitor;
    const code = new Map<string, number>();
    page.on('response', (response) => {
      if (!new URL(response.url()).pathname.endsWith('.js')) return;
      void response.body().then((body) => code.set(response.url(), gzipSync(body).length));
    });
    await page.route('**/pictures/**', (route) => route.fulfill({ body: drawn, contentType: 'image/jpeg' }));
    await page.addInitScript(() => {
      const measured = { shift: 0 };
      Object.assign(window, { measured });
      new PerformanceObserver((list) => {
        for (const entry of list.getEntries()) measured.shift += (entry as PerformanceEntry & { value: number }).value;
      }).observe({ type: 'layout-shift', buffered: true });
    });
    await page.goto(`${site.house.address}/sheets/${open.sheet.id}`);
    await page.getByRole('link', { name: /^Proof 1,/ }).waitFor();
    expect(await page.getByText('1,000').count()).toBe(1);

    for (let turn = 0; turn < 25; turn += 1) {
      await page.mouse.wheel(0, 1200);
      await page.waitForTimeout(40);
    }
    await page.keyboard.press('End');
    await page.getByRole('link', { name: new RegExp(`^Proof ${MANY},`) }).waitFor();
    expect(await page.getByRole('figure').count()).toBeLessThan(80);
    const measured = await page.evaluate(() => (window as unknown as { measured: Measured }).measured);
    expect(measured.shift).toBeLessThan(0.01);

    const weight = [...code.values()].reduce((sum, size) => sum + size, 0);
    expect(code.size).toBeGreaterThan(1);
    expect(weight).toBeLessThan(HEAVIEST);
    await visitor.close();
  });
});
