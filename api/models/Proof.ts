import { Model } from 'objection';
import { Frame } from './Frame.ts';
import { StudioRow } from './StudioRow.ts';

/** What the client sees: a frame with the sheet's watermark. */
export class Proof extends StudioRow {
  static override tableName = 'proofs';
  static override get relationMappings() {
    return { frame: { relation: Model.BelongsToOneRelation, modelClass: Frame, join: { from: 'proofs.frameId', to: 'frames.id' } } };
  }

  declare sheetId: string;
  declare frameId: string;
  declare viewId: string | null;
  /** Stays with the proof whatever the order. */
  declare number: number;
  declare position: number;
  declare watermarkHash: string | null;
  declare createdAt: Date;
  declare frame?: Frame;
}
