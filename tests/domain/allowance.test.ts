import { describe, expect, it } from 'vitest';
import { allowanceState, placePicks } from '../../api/domain/allowance.ts';

describe('the allowance', () => {
  const agreed = { included: 12, extraPrice: 8500 };

  it('has included picks left while fewer are picked', () => {
    expect(allowanceState(9, agreed)).toEqual({ picks: 9, included: 12, left: 3, extras: 0, cost: 0 });
  });

  it('is just used up at the included number', () => {
    expect(allowanceState(12, agreed)).toMatchObject({ left: 0, extras: 0, cost: 0 });
  });

  it('charges every pick beyond it', () => {
    expect(allowanceState(14, agreed)).toMatchObject({ left: 0, extras: 2, cost: 17000 });
  });

  it('of nothing makes every pick an extra', () => {
    expect(allowanceState(3, { included: 0, extraPrice: 100 })).toMatchObject({ extras: 3, cost: 300 });
  });
});

describe('the place of a pick', () => {
  it('makes the last ones in the order of the sheet the extras', () => {
    expect(placePicks(['a', 'b', 'c'], 2)).toEqual([
      { pick: 'a', number: 1, extra: false },
      { pick: 'b', number: 2, extra: false },
      { pick: 'c', number: 3, extra: true },
    ]);
  });
});
