import { fitForUse, sayPpi, type Fit, type PictureSize, type Use } from '../../../../api/domain/fit-for-use.ts';

const NAMED = 3;

/**
 * What a picture is good for, in one line: "Sharp for every use", "Sharp for 9 of 11 uses, not for A1 print (215 ppi), A0 print (152 ppi)";
 * of many the first three are named.
 * Empty where there are no uses.
 */
export function fitLine(picture: PictureSize, uses: readonly Use[]): string {
  if (uses.length === 0) return '';
  const missed = uses.flatMap((use) => {
    const fit = fitForUse(picture, use);
    return fit.sharp ? [] : [`${use.title}${shortly(fit)}`];
  });
  if (missed.length === 0) return 'Sharp for every use';
  const sharp = uses.length - missed.length;
  if (sharp === 0) return 'Sharp for none of the uses';
  const more = missed.length - NAMED;
  return `Sharp for ${sharp} of ${uses.length} uses, not for ${missed.slice(0, NAMED).join(', ')}${more > 0 ? ` and ${more} more` : ''}`;
}

function shortly(fit: Fit & { sharp: false }): string {
  return fit.kind === 'print' ? ` (${sayPpi(fit.ppi)} ppi)` : '';
}
