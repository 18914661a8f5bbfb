/** Longest sides in pixels of the pictures people see: two for sheets, one for the viewer. */
export const DERIVATIVE_SIZES = [480, 960, 2560] as const;
export type DerivativeSize = (typeof DERIVATIVE_SIZES)[number];
