import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { watermarkProofs } from '../../api/features/sheets/watermark-proofs.job.ts';
import { Proof } from '../../api/models/Proof.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
beforeAll(async () => void (house = await startHouse()));
afterAll(() => house.stop());

describe('a watermark that is changed while the old one is being laid', () => {
  it('is not undone by the run that began before the change', async () => {
    const { sheet } = await makeOpenSheet(house, await makeStudio(house), { proofs: 1 });
    const mark = { kind: 'text', text: 'HARROW LANE', opacity: 0.5, size: 0.6, tiled: false };
    await house.ctx.knex('sheets').where({ id: sheet.id }).update({ watermark: mark, watermarkHash: 'older' });
    const { pixels } = house.ctx;
    // While the old run is at its pixels, the watermark changes and the new run gets through with the proof.
    const slow: typeof pixels = {
      ...pixels,
      watermark: async (...given) => {
        const marked = await pixels.watermark(...given);
        await house.ctx.knex('sheets').where({ id: sheet.id }).update({ watermarkHash: 'newer' });
        await Proof.query().where({ sheetId: sheet.id }).patch({ watermarkHash: 'newer' });
        return marked;
      },
    };
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await watermarkProofs.run({ ...house.ctx, pixels: slow }, { sheetId: sheet.id }, tools);
    const [proof] = await Proof.query().where({ sheetId: sheet.id });
    expect(proof?.watermarkHash).toBe('newer');
  });
});
