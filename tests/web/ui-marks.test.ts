import { describe, expect, it } from 'vitest';
import type { GuestProof } from '../../api/contract/guest-sheets.ts';
import { MarkKeeper, withMark, withWishes } from '../../web/src/features/marks/mark-keeper.ts';
import { marksOf, numberPicks, readMarks, type Person } from '../../web/src/features/marks/read-marks.ts';
import { comparePicks } from '../../web/src/features/review/compare-picks.ts';

const people: Person[] = [
  { accountId: 'ines', name: 'Ines Okafor', initials: 'IO', role: 'lead' },
  { accountId: 'petra', name: 'Petra Thorn', initials: 'PT', role: 'reviewer' },
  { accountId: 'milo', name: 'Milo Brandt', initials: 'MB', role: 'reviewer' },
];
const proofs = ['a', 'b', 'c', 'd'].map((id, at) => ({ id, number: at + 1 }) as GuestProof);
const mark = (proofId: string, accountId: string) => ({ proofId, accountId });

/** A server whose answers the test gives when it likes. */
function heldServer() {
  const asked: { proofId: string; marked: boolean; answer: (error?: Error) => void }[] = [];
  const saved: boolean[] = [];
  const refused: boolean[] = [];
  const keeper = new MarkKeeper({
    send: (proofId, marked) =>
      new Promise<void>((resolve, reject) => asked.push({ proofId, marked, answer: (error) => (error ? reject(error) : resolve()) })),
    onSaved: (_proofId, marked) => void saved.push(marked),
    onRefused: (_proofId, marked) => void refused.push(marked),
  });
  return { keeper, asked, saved, refused };
}
const settled = () => new Promise((resolve) => setTimeout(resolve, 0));

describe('reading marks', () => {
  it('makes a pick of a proof that a lead marked, and of no other', () => {
    const read = readMarks([mark('a', 'ines'), mark('b', 'petra')], people, 'petra');
    expect(marksOf(read, 'a')).toMatchObject({ mine: false, picked: true });
    expect(marksOf(read, 'b')).toMatchObject({ mine: true, picked: false, others: [] });
    expect(marksOf(read, 'c')).toEqual({ mine: false, picked: false, others: [] });
  });

  it('names the others, leads first, and leaves out who is no longer on the sheet', () => {
    const read = readMarks([mark('a', 'milo'), mark('a', 'gone'), mark('a', 'ines'), mark('a', 'petra')], people, 'petra');
    expect(marksOf(read, 'a').others.map((person) => person.initials)).toEqual(['IO', 'MB']);
  });

  it('numbers picks in the order of the sheet, whoever marked first, and calls the last ones extras', () => {
    const read = readMarks([mark('d', 'ines'), mark('a', 'ines'), mark('c', 'ines')], people, 'ines');
    expect([...numberPicks(proofs, read, 2)]).toEqual([
      ['a', { number: 1, extra: false }],
      ['c', { number: 2, extra: false }],
      ['d', { number: 3, extra: true }],
    ]);
  });

  it('compares the picks somebody saw with those of now', () => {
    const changes = comparePicks(proofs, new Set(['a', 'b']), new Set(['b', 'd']));
    expect(changes.added.map(({ id }) => id)).toEqual(['d']);
    expect(changes.gone.map(({ id }) => id)).toEqual(['a']);
  });
});

describe('keeping marks that are under way', () => {
  it('shows a wish at once and until it is through', async () => {
    const { keeper, asked, saved } = heldServer();
    keeper.want('a', true, false);
    expect(withWishes([], keeper.wishes(), 'ines')).toEqual([mark('a', 'ines')]);
    asked[0]?.answer();
    await settled();
    expect(saved).toEqual([true]);
    expect(keeper.wishes().size).toBe(0);
  });

  it('falls back to what was before where the server refuses', async () => {
    const { keeper, asked, refused } = heldServer();
    keeper.want('a', true, false);
    asked[0]?.answer(new Error('ended'));
    await settled();
    expect(refused).toEqual([true]);
    expect(withWishes([], keeper.wishes(), 'ines')).toEqual([]);
  });

  it('has one request a proof under way and sends only the last wish after it', async () => {
    const { keeper, asked } = heldServer();
    for (const wanted of [true, false, true, false]) keeper.want('a', wanted, false);
    expect(asked.map(({ marked }) => marked)).toEqual([true]);
    asked[0]?.answer();
    await settled();
    expect(asked.map(({ marked }) => marked)).toEqual([true, false]);
    asked[1]?.answer();
    await settled();
    expect(keeper.wishes().size).toBe(0);
  });

  it('sends nothing more where the last wish is what the server has', async () => {
    const { keeper, asked } = heldServer();
    for (const wanted of [true, false, true]) keeper.want('a', wanted, false);
    asked[0]?.answer();
    await settled();
    expect(asked).toHaveLength(1);
  });

  it('keeps proofs apart', async () => {
    const { keeper, asked, refused } = heldServer();
    keeper.want('a', true, false);
    keeper.want('b', true, false);
    asked[1]?.answer(new Error('no'));
    await settled();
    expect([...keeper.wishes()]).toEqual([['a', true]]);
    expect(refused).toEqual([true]);
  });

  it('sets and takes one person’s mark without touching another’s', () => {
    const marks = [mark('a', 'petra'), mark('b', 'ines')];
    expect(withMark(marks, 'a', 'ines', true)).toEqual([...marks, mark('a', 'ines')]);
    expect(withMark(marks, 'a', 'ines', false)).toEqual(marks);
    expect(withMark(withMark(marks, 'a', 'ines', true), 'a', 'ines', true)).toHaveLength(3);
  });
});
