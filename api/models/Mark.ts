import { Model } from 'objection';

/** One guest's choice of a proof; the lead's marks are the picks. */
export class Mark extends Model {
  static override tableName = 'marks';
  static override idColumn = ['sheetId', 'proofId', 'accountId'];

  declare sheetId: string;
  declare proofId: string;
  declare accountId: string;
  declare studioId: string;
  declare markedAt: Date;
}
