/** How the edge of a level is continued. The paper's authors mirror with the edge's pixel doubled and expand with it repeated; OpenCV mirrors around it. */
export type EdgeRule = 'symmetric' | 'reflect-101';

/** What Mertens, Kautz, Van Reeth (Exposure Fusion, Pacific Graphics 2007) leave to whoever writes it down. */
export interface FusionConventions {
  /** How much each measure counts: its exponent. 0 leaves it out. */
  contrast: number;
  saturation: number;
  exposedness: number;
  /** Width of the well-exposed tones around the middle, on a scale of 0 to 1. */
  sigma: number;
  edge: EdgeRule;
  /** Levels of the pyramid, the picture itself counted. */
  levels: (shortSide: number) => number;
}

/** As in the paper and its authors' own program: floor(log2 of the short side) levels. */
export const PAPER: FusionConventions = {
  contrast: 1,
  saturation: 1,
  exposedness: 1,
  sigma: 0.2,
  edge: 'symmetric',
  levels: (shortSide) => Math.max(1, Math.floor(Math.log2(shortSide))),
};

/** As OpenCV's MergeMertens does it (modules/photo/src/merge.cpp): other edges, and one level more. */
export const OPENCV: FusionConventions = { ...PAPER, edge: 'reflect-101', levels: (shortSide) => Math.floor(Math.log2(shortSide)) + 1 };

/** The place inside 0 … length − 1 that stands for one up to two beyond it. */
export function insideEdge(at: number, length: number, edge: EdgeRule): number {
  const doubled = edge === 'symmetric' ? 1 : 0;
  let inside = at;
  while (inside < 0 || inside >= length) {
    if (length === 1) return 0;
    inside = inside < 0 ? -inside - doubled : 2 * (length - 1) - inside + doubled;
  }
  return inside;
}
