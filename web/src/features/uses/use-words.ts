import { neededPpi, type Use } from '../../../../api/domain/fit-for-use.ts';

export const KINDS: Record<Use['kind'], { words: string; hint: string }> = {
  page: { words: 'A page in the hand', hint: 'Printed, and read from nearby.' },
  screen: { words: 'A screen', hint: 'Shown in so many pixels.' },
  'seen-from': { words: 'Seen from a distance', hint: 'A poster, a hoarding: the eye resolves one arc minute.' },
};

/** Centimetres, from three metres on metres: "21", "0.5"; "6 m". */
function length(mm: number): string {
  return mm >= 3000 ? `${Number((mm / 1000).toFixed(2))} m` : `${Number((mm / 10).toFixed(1))} cm`;
}

/** "21 × 29.7 cm", "2560 × 1440 px", "6 m wide" */
export function sizeOf(use: Use): string {
  if (use.kind === 'screen') return `${use.widthPx} × ${use.heightPx} px`;
  if (use.heightMm === null) return `${length(use.widthMm)} wide`;
  const [width, height] = [length(use.widthMm), length(use.heightMm)];
  const unit = height.split(' ')[1];
  return `${width.endsWith(` ${unit}`) ? width.split(' ')[0] : width} × ${height}`;
}

/** What it takes to be sharp: "300 ppi", "from 10 m, 9 ppi", "its own pixels". */
export function neededOf(use: Use): string {
  if (use.kind === 'screen') return 'its own pixels';
  const ppi = neededPpi(use);
  const words = `${ppi < 10 ? Number(ppi.toFixed(1)) : Math.round(ppi)} ppi`;
  return use.kind === 'page' ? words : `from ${Number((use.distanceMm / 1000).toFixed(2))} m, ${words}`;
}

/** A short name of small letters that no other use has. */
export function idFor(title: string, taken: readonly string[]): string {
  const letters = title
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 30);
  const base = letters || 'use';
  if (!taken.includes(base)) return base;
  let number = 2;
  while (taken.includes(`${base}-${number}`)) number += 1;
  return `${base}-${number}`;
}

/** The list with one of its entries a place earlier (−1) or later (1). */
export function moved(uses: readonly Use[], at: number, by: 1 | -1): Use[] {
  const next = [...uses];
  const [one] = next.splice(at, 1);
  if (one) next.splice(at + by, 0, one);
  return next;
}
