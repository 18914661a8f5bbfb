import { Model } from 'objection';
import { Pick } from './Pick.ts';
import { StudioRow } from './StudioRow.ts';

/** What the lead sent: written once, never changed. */
export class PickList extends StudioRow {
  static override tableName = 'pickLists';
  static override get relationMappings() {
    return { picks: { relation: Model.HasManyRelation, modelClass: Pick, join: { from: 'pickLists.id', to: 'picks.pickListId' } } };
  }

  declare sheetId: string;
  declare commissionId: string;
  declare number: number;
  declare sentBy: string | null;
  declare sentByName: string;
  declare sentAt: Date;
  declare words: string;
  declare pickCount: number;
  declare allowance: number;
  declare extraCount: number;
  declare extraPrice: number;
  declare currency: string;
  declare picks?: Pick[];
}
