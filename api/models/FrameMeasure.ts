import type { FrameMeasures } from '../domain/frame-measures.ts';
import { StudioRow } from './StudioRow.ts';

/** What was measured on a frame's picture. */
export class FrameMeasure extends StudioRow {
  static override tableName = 'frameMeasures';
  static override idColumn = 'frameId';
  static override jsonAttributes = ['measures'];

  declare frameId: string;
  declare measures: FrameMeasures;
}
