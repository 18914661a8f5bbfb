import type { PageUse, Use } from './fit-for-use.ts';

/** Common practice for a page in the hand; no standard asks for it. */
const PAGE_PPI = 300;

const page = (id: string, title: string, widthMm: number, heightMm: number): PageUse => ({
  id,
  title,
  kind: 'page',
  widthMm,
  heightMm,
  ppi: PAGE_PPI,
});

/** What a studio's table of uses begins with. Paper sizes by ISO 216, in millimetres; sizes on screens are common practice. */
export const DEFAULT_USES: readonly Use[] = [
  page('a4-page', 'A4 page', 210, 297),
  page('a3-spread', 'A3 spread', 420, 297),
  page('a2-print', 'A2 print', 420, 594),
  page('a1-print', 'A1 print', 594, 841),
  page('a0-print', 'A0 print', 841, 1189),
  { id: 'a0-poster', title: 'A0 poster seen from 1.5 m', kind: 'seen-from', widthMm: 841, heightMm: 1189, distanceMm: 1500 },
  { id: 'hoarding', title: '6 m hoarding seen from 10 m', kind: 'seen-from', widthMm: 6000, heightMm: null, distanceMm: 10_000 },
  { id: 'website-banner', title: 'Website banner 16:9', kind: 'screen', widthPx: 2560, heightPx: 1440 },
  { id: 'large-screen', title: 'Large screen 16:9', kind: 'screen', widthPx: 3840, heightPx: 2160 },
  { id: 'social-square', title: 'Social media, square', kind: 'screen', widthPx: 1080, heightPx: 1080 },
  { id: 'social-upright', title: 'Social media, upright', kind: 'screen', widthPx: 1080, heightPx: 1350 },
];
