import { Model } from 'objection';
import { Bracket } from './Bracket.ts';
import { Frame } from './Frame.ts';
import { StudioRow } from './StudioRow.ts';

/** What the client sees: a single frame, or a bracket's merged picture, with the sheet's watermark. */
export class Proof extends StudioRow {
  static override tableName = 'proofs';
  static override get relationMappings() {
    return {
      frame: { relation: Model.BelongsToOneRelation, modelClass: Frame, join: { from: 'proofs.frameId', to: 'frames.id' } },
      bracket: { relation: Model.BelongsToOneRelation, modelClass: Bracket, join: { from: 'proofs.bracketId', to: 'brackets.id' } },
    };
  }

  declare sheetId: string;
  /** The single frame, or the lead of the bracket. */
  declare frameId: string;
  declare bracketId: string | null;
  declare viewId: string | null;
  /** Stays with the proof whatever the order. */
  declare number: number;
  declare position: number;
  declare watermarkHash: string | null;
  /** What the watermarked pictures of a bracket's proof were made of. */
  declare pictured: string | null;
  declare createdAt: Date;
  declare frame?: Frame;
  declare bracket?: Bracket | null;
}
