import { FEWEST_EXPOSURES, MOST_EXPOSURES } from './candidate.ts';
import { rememberedLikeness } from './likeness.ts';
import type { Row } from './row.ts';
import { worthAsBracket } from './worth.ts';

interface Split {
  worth: number;
  /** Length of the part that ends here; 1 is a frame that stands alone. */
  length: number;
}

/**
 * Cuts a row of exposures into brackets and frames that stand alone, so that the brackets together are worth most: two brackets of one view in
 * a row are two. Answers the brackets, in order, after one step for each exposure.
 */
export function* splitRow(row: Row): Generator<void, Row[]> {
  const compare = rememberedLikeness();
  const best: Split[] = [{ worth: 0, length: 0 }];
  for (let end = 1; end <= row.length; end++) {
    let split: Split = { worth: (best[end - 1] as Split).worth, length: 1 };
    for (let length = FEWEST_EXPOSURES; length <= Math.min(MOST_EXPOSURES, end); length++) {
      const worth = worthAsBracket(row.slice(end - length, end), compare);
      // An exposure that stands twice stands twice in every longer part too.
      if (worth === 'never') break;
      const total = (best[end - length] as Split).worth + worth;
      if (worth > 0 && total > split.worth + 1e-9) split = { worth: total, length };
    }
    best.push(split);
    yield;
  }
  return cutBackwards(row, best);
}

function cutBackwards(row: Row, best: readonly Split[]): Row[] {
  const brackets: Row[] = [];
  for (let end = row.length; end > 0;) {
    const { length } = best[end] as Split;
    if (length > 1) brackets.unshift(row.slice(end - length, end));
    end -= length;
  }
  return brackets;
}
