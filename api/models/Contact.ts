import { StudioRow } from './StudioRow.ts';

export class Contact extends StudioRow {
  static override tableName = 'contacts';

  declare clientId: string;
  declare name: string;
  declare email: string;
  declare position: string;
  declare telephone: string;
  declare version: number;
  declare createdAt: Date;
}
