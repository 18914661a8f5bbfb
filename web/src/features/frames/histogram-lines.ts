/** A drawing so many units wide and high; one unit a step of brightness. */
export const WIDTH = 64;
export const HEIGHT = 36;

/** How high a full step is drawn. A few steps at the ends hold what is clipped and would press all others flat: they do not count. */
export function topOf(curves: readonly (readonly number[])[]): number {
  return Math.max(1, ...curves.flatMap((curve) => curve.slice(1, -1)));
}

/** The points of a curve, left to right, "0,36 1,30.5 …"; what is higher than the drawing ends at its edge. */
export function pointsOf(curve: readonly number[], top: number): string {
  return curve.map((parts, at) => `${at + 0.5},${(HEIGHT - Math.min(1, parts / top) * HEIGHT).toFixed(1)}`).join(' ');
}
