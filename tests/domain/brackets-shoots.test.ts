import { describe, expect, it } from 'vitest';
import { groupBrackets } from '../../api/domain/brackets.ts';
import { Chance } from '../support/shoots/chance.ts';
import { makeShoot, type Shoot } from '../support/shoots/shoot.ts';

const SHOOTS = 1000;

const asSet = (ids: readonly string[]) => [...ids].sort().join(' ');

interface Tally {
  right: number;
  found: number;
  real: number;
}

/** A bracket counts as right only where it holds exactly the frames that were taken for it. */
function count(total: Tally, { frames, brackets }: Shoot): void {
  const real = new Set(brackets.map(asSet));
  const found = groupBrackets(frames).map(({ frameIds }) => asSet(frameIds));
  total.right += found.filter((bracket) => real.has(bracket)).length;
  total.found += found.length;
  total.real += real.size;
}

describe('A thousand shoots made by chance', () => {
  it('have at least 99 of 100 of their brackets found, and at least 99 of 100 found ones are right', () => {
    const total = { right: 0, found: 0, real: 0 };
    for (let seed = 1; seed <= SHOOTS; seed++) count(total, makeShoot(seed));
    expect(total.real).toBeGreaterThan(4 * SHOOTS);
    expect(total.right / total.found).toBeGreaterThanOrEqual(0.99);
    expect(total.right / total.real).toBeGreaterThanOrEqual(0.99);
  }, 400_000);

  it('give the same brackets in whatever order the frames arrive', () => {
    const chance = new Chance(7);
    for (let seed = 1; seed <= 25; seed++) {
      const { frames } = makeShoot(seed);
      const found = groupBrackets(frames);
      const shuffled = frames.map((frame) => ({ frame, key: chance.next() })).sort((one, two) => one.key - two.key);
      expect(groupBrackets(shuffled.map(({ frame }) => frame))).toEqual(found);
      expect(groupBrackets([...frames].reverse())).toEqual(found);
    }
  });
});
