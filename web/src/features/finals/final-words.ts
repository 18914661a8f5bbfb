import type { Doubt, FinalVersionItem, PickForFinal } from '../../../../api/contract/finals.ts';
import { formatBytes } from '../../lib/bytes.ts';

const DOUBTS: Record<Doubt, string> = {
  several: 'Several picks fit its name equally well.',
  'weak-name': 'Only a part of its name is that of a pick.',
  'time-contradicts': 'Its name says one pick, the time it was taken at another.',
  'time-only': 'Its name is like none, but it was taken at the very time of a pick.',
  'nothing-alike': 'Neither its name nor its time is that of a pick.',
};

/** Why a final's pick is asked, in a sentence. */
export function doubtWords(doubt: Doubt): string {
  return DOUBTS[doubt];
}

/** "6 000 × 4 000 px · 31.2 MB" with thin spaces. */
export function sizeWords({ width, height, size }: Pick<FinalVersionItem, 'width' | 'height' | 'size'>): string {
  const grouped = (pixels: number) => String(pixels).replace(/\B(?=(\d{3})+$)/g, '\u2009');
  return `${grouped(width)} × ${grouped(height)} px · ${formatBytes(size)}`;
}

/** "Pick 3, East front, dusk": with its sheet where there are several. */
export function pickWords(pick: PickForFinal, sheets: number): string {
  const sheet = sheets > 1 ? `Sheet ${pick.sheetNumber}, pick` : 'Pick';
  return `${sheet} ${pick.number}, ${pick.viewTitle ?? 'also made'} · ${pick.frameName}`;
}

/** How many sheets the picks come from. */
export function sheetCount(picks: readonly PickForFinal[]): number {
  return new Set(picks.map((pick) => pick.sheetNumber)).size;
}
