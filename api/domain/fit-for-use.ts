interface Named {
  id: string;
  /** What people call it: "A2 print". */
  title: string;
}
/** Paper held in the hand. Millimetres; it is turned as the picture is. */
export interface PageUse extends Named {
  kind: 'page';
  widthMm: number;
  heightMm: number;
  ppi: number;
}
/** A place on a screen, in its own pixels. It is not turned: a banner stays a banner. */
export interface ScreenUse extends Named {
  kind: 'screen';
  widthPx: number;
  heightPx: number;
}
/** Something seen from afar. Without a height it takes the picture's own shape; with one it is turned as the picture is. */
export interface SeenFromUse extends Named {
  kind: 'seen-from';
  widthMm: number;
  heightMm: number | null;
  distanceMm: number;
}
/** What a picture is wanted for. */
export type Use = PageUse | ScreenUse | SeenFromUse;

export interface PictureSize {
  width: number;
  height: number;
}
/** What the picture gives: enough, or the pixels per inch that are there and the largest size, in the use's shape, that is sharp. */
export type Fit =
  | { sharp: true }
  | { sharp: false; kind: 'print'; ppi: number; largest: { widthMm: number; heightMm: number } }
  | { sharp: false; kind: 'screen'; largest: { widthPx: number; heightPx: number } };

const MM_PER_INCH = 25.4;
/** An eye of ordinary sight tells apart what is one arc minute wide: 1 / tan(1′) = 3437.75, usually written 3438. */
const ACUITY = 1 / Math.tan(Math.PI / 180 / 60);

/** Pixels per inch beyond which nobody sees more from that distance (millimetres): 3438 / inches. */
export function ppiSeenFrom(distanceMm: number): number {
  return ACUITY / (distanceMm / MM_PER_INCH);
}

/** Pixels per inch that a printed use needs. */
export function neededPpi(use: PageUse | SeenFromUse): number {
  return use.kind === 'page' ? use.ppi : ppiSeenFrom(use.distanceMm);
}

/** The printed size in millimetres, turned as the picture is. */
function printedSize(picture: PictureSize, use: PageUse | SeenFromUse): PictureSize {
  const { widthMm, heightMm } = use;
  if (heightMm === null) return { width: widthMm, height: (widthMm * picture.height) / picture.width };
  const turned = widthMm > heightMm !== picture.width > picture.height;
  return turned ? { width: heightMm, height: widthMm } : { width: widthMm, height: heightMm };
}

/** The largest part of the picture that has the shape of the use. */
function croppedTo(picture: PictureSize, shape: PictureSize): PictureSize {
  const scale = Math.min(picture.width / shape.width, picture.height / shape.height);
  return { width: shape.width * scale, height: shape.height * scale };
}

function covers(picture: PictureSize, pixels: PictureSize): boolean {
  return picture.width >= Math.round(pixels.width) && picture.height >= Math.round(pixels.height);
}

function fitOnScreen(picture: PictureSize, use: ScreenUse): Fit {
  const wanted = { width: use.widthPx, height: use.heightPx };
  if (covers(picture, wanted)) return { sharp: true };
  const part = croppedTo(picture, wanted);
  return { sharp: false, kind: 'screen', largest: { widthPx: Math.floor(part.width), heightPx: Math.floor(part.height) } };
}

/**
 * Says whether a picture (pixels, upright) covers a use sharply. The picture is thought cropped to the use's shape.
 * Needed are the use's own ppi (300 for a page in the hand is common practice), or what an eye resolves from its distance.
 */
export function fitForUse(picture: PictureSize, use: Use): Fit {
  if (use.kind === 'screen') return fitOnScreen(picture, use);
  const size = printedSize(picture, use);
  const perMm = neededPpi(use) / MM_PER_INCH;
  if (covers(picture, { width: size.width * perMm, height: size.height * perMm })) return { sharp: true };
  const part = croppedTo(picture, size);
  const largest = { widthMm: part.width / perMm, heightMm: part.height / perMm };
  return { sharp: false, kind: 'print', ppi: (part.width / size.width) * MM_PER_INCH, largest };
}

/** Rounded down, so that nothing is promised: "215", below ten "8.4". */
export function sayPpi(ppi: number): string {
  return String(ppi < 10 ? Math.floor(ppi * 10) / 10 : Math.floor(ppi));
}

/** Sizes are rounded down, half a pixel aside, so that nothing is promised: "42 × 28 cm", "8.4 × 5.6 cm", "4.2 × 2.8 m". */
function saySize({ widthMm, heightMm }: { widthMm: number; heightMm: number }): string {
  const longer = Math.max(widthMm, heightMm);
  const [unit, mm, digits] = longer >= 3000 ? ['m', 1000, 1] : ['cm', 10, longer < 200 ? 1 : 0];
  const say = (length: number) => String(Math.floor(((length + 0.05) / mm) * 10 ** digits) / 10 ** digits);
  return `${say(widthMm)} × ${say(heightMm)} ${unit}`;
}

/** The largest size that is sharp: "42 × 28 cm", "1600 × 900 px". */
export function sayLargest(fit: Fit & { sharp: false }): string {
  return fit.kind === 'screen' ? `${fit.largest.widthPx} × ${fit.largest.heightPx} px` : saySize(fit.largest);
}

/** The answer in words: "sharp", "215 ppi, sharp up to 42 × 28 cm", "sharp up to 1600 × 900 px". */
export function sayFit(fit: Fit): string {
  if (fit.sharp) return 'sharp';
  const upTo = `sharp up to ${sayLargest(fit)}`;
  return fit.kind === 'screen' ? upTo : `${sayPpi(fit.ppi)} ppi, ${upTo}`;
}
