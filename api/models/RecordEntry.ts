import { Model } from 'objection';

/** One line of the append-only record. */
export class RecordEntry extends Model {
  static override tableName = 'recordEntries';
  static override jsonAttributes = ['about'];

  declare id: number;
  declare studioId: string;
  declare commissionId: string | null;
  declare at: Date;
  declare accountId: string | null;
  declare byName: string;
  declare byKind: 'staff' | 'guest' | 'oriel';
  declare did: string;
  declare says: string;
  declare about: Record<string, unknown>;
}
