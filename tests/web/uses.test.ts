import { describe, expect, it } from 'vitest';
import { CheckThresholds } from '../../api/contract/checks.ts';
import { DEFAULT_THRESHOLDS } from '../../api/domain/check-thresholds.ts';
import { DEFAULT_USES } from '../../api/domain/default-uses.ts';
import { THRESHOLD_GROUPS } from '../../web/src/features/checks/threshold-fields.ts';
import { fieldsOf, NEW_USE, readUse } from '../../web/src/features/uses/use-fields.ts';
import { idFor, moved, neededOf, sizeOf } from '../../web/src/features/uses/use-words.ts';

const named = (title: string) => DEFAULT_USES.find((use) => use.title.startsWith(title)) ?? DEFAULT_USES[0]!;

describe('the table of uses', () => {
  // ISO 216: A4 is 210 × 297 mm. One arc minute at 10 m is 3438 / 393.7 in = 8.7 ppi.
  it('says sizes and what is needed', () => {
    expect([named('A4'), named('6 m'), named('A0 poster'), named('Website')].map(sizeOf)).toEqual([
      '21 × 29.7 cm',
      '6 m wide',
      '84.1 × 118.9 cm',
      '2560 × 1440 px',
    ]);
    expect([named('A4'), named('6 m'), named('A0 poster'), named('Website')].map(neededOf)).toEqual([
      '300 ppi',
      'from 10 m, 8.7 ppi',
      'from 1.5 m, 58 ppi',
      'its own pixels',
    ]);
  });

  it('gives every use back as it was typed', () => {
    for (const use of DEFAULT_USES) expect(readUse(fieldsOf(use), use.id)).toEqual({ use });
  });

  it('takes a decimal comma, and says at the field what is wrong', () => {
    const fields = { ...NEW_USE, title: 'Postcard', width: '14,8', height: '10,5' };
    expect(readUse(fields, 'postcard')).toEqual({
      use: { id: 'postcard', title: 'Postcard', kind: 'page', widthMm: 148, heightMm: 105, ppi: 300 },
    });
    expect(readUse({ ...fields, title: ' ', width: 'wide', height: '0.1' }, 'x')).toEqual({
      wrong: { title: 'Name the use.', width: 'Write a number.', height: 'At least 1 cm.' },
    });
    expect(readUse({ ...fields, kind: 'seen-from', height: '', distance: '0,05' }, 'x')).toEqual({
      wrong: { distance: 'At least 10 cm.' },
    });
  });

  it('names a use by its title, and no two alike', () => {
    expect(idFor('A3 spread, 300 ppi', [])).toBe('a3-spread-300-ppi');
    expect(idFor('A3 spread', ['a3-spread', 'a3-spread-2'])).toBe('a3-spread-3');
    expect(idFor('工地', [])).toBe('use');
  });

  it('moves one up or down and loses none', () => {
    const ids = moved(DEFAULT_USES, 1, -1).map(({ id }) => id);
    expect(ids.slice(0, 3)).toEqual(['a3-spread', 'a4-page', 'a2-print']);
    expect(moved(DEFAULT_USES, 1, 1).map(({ id }) => id)[2]).toBe('a3-spread');
    expect(ids).toHaveLength(DEFAULT_USES.length);
  });
});

describe('the form of the thresholds', () => {
  const fields = THRESHOLD_GROUPS.flatMap((group) => group.fields);

  it('asks for each threshold once, with the limits of the contract', () => {
    expect(fields.map(({ name }) => name).sort()).toEqual(Object.keys(DEFAULT_THRESHOLDS).sort());
    for (const { name, from, to } of fields) {
      const at = (value: number) => {
        const read = CheckThresholds.safeParse({ ...DEFAULT_THRESHOLDS, [name]: value });
        return read.success || read.error.issues.every(({ code }) => code === 'custom');
      };
      expect([name, at(from), at(to), at(from - 0.01), at(to + 0.01)]).toEqual([name, true, true, false, false]);
    }
  });
});
