import { Model } from 'objection';
import { FinalVersion } from './FinalVersion.ts';
import { StudioRow } from './StudioRow.ts';

/** A finished file, matched to its pick; it has versions. */
export class Final extends StudioRow {
  static override tableName = 'finals';
  static override jsonAttributes = ['candidates'];
  static override get relationMappings() {
    return {
      versions: { relation: Model.HasManyRelation, modelClass: FinalVersion, join: { from: 'finals.id', to: 'finalVersions.finalId' } },
    };
  }

  declare commissionId: string;
  declare frameId: string | null;
  declare title: string;
  declare match: 'by-name' | 'by-hand' | 'ask' | 'none';
  /** Frame ids that might be meant, where it has to be asked. */
  declare candidates: string[];
  declare deletedAt: Date | null;
  declare version: number;
  declare createdAt: Date;
  declare versions?: FinalVersion[];
}
