import { StudioRow } from './StudioRow.ts';

/** One picture the brief asks for, in words. */
export class View extends StudioRow {
  static override tableName = 'views';

  declare commissionId: string;
  declare position: number;
  declare title: string;
  declare askedFor: string;
  declare version: number;
  declare createdAt: Date;
}
