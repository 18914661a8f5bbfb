import type { TiltMeasure } from '../../domain/frame-measures.ts';
import type { Plane } from './plane.ts';

export function measureTilt(_luma: Plane): TiltMeasure {
  return { horizon: null, uprights: null };
}
