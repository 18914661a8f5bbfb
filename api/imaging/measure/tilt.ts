import type { Direction, TiltMeasure, Uprights } from '../../domain/frame-measures.ts';
import { transposed, type Plane } from './plane.ts';
import { straightEdges } from './straight-edges.ts';
import { findFamily, samplesOf, type Support } from './vanishing.ts';

/** Grey levels over two pixels that an edge has at least. */
const LEAST_CHANGE = 8;
/** A camera is not turned farther by mistake; uprights may lean farther at the edge where it looks up. Degrees. */
const REACH = { turn: 8, spread: 32 };

const degrees = (tangent: number): number => (Math.atan(tangent) * 180) / Math.PI;

/**
 * 0 to 1: the share of edges that agree, less where there are few of them (`enough` pixels are), and less where a turn cannot
 * be told from edges that converge.
 */
function certaintyOf({ agreeing, against, error }: Support, enough: number): number {
  const share = agreeing / (agreeing + against + 1);
  return share * Math.min(1, agreeing / enough) * Math.min(1, 0.15 / error);
}

function measureUprights(picture: Plane): Uprights | null {
  const samples = samplesOf(straightEdges(picture, LEAST_CHANGE), picture.width / 2);
  if (samples.length === 0) return null;
  const { family, support } = findFamily(samples, REACH);
  // Going down an upright that leans to the right, its place moves to the left.
  return { angle: degrees(-family.turn), converging: degrees(family.spread), certainty: certaintyOf(support, picture.height * 2) };
}

function measureHorizon(picture: Plane): Direction | null {
  const samples = samplesOf(straightEdges(transposed(picture), LEAST_CHANGE), picture.height / 2);
  if (samples.length === 0) return null;
  const { family, support } = findFamily(samples, { ...REACH, spread: 0 });
  return { angle: degrees(family.turn), certainty: certaintyOf(support, picture.width) };
}

/** Finds how the horizon and the uprights of a picture lie, from the directions of its straight edges. */
export function measureTilt(picture: Plane): TiltMeasure {
  return { horizon: measureHorizon(picture), uprights: measureUprights(picture) };
}
