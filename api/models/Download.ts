import { StudioRow } from './StudioRow.ts';

export class Download extends StudioRow {
  static override tableName = 'downloads';

  declare deliveryId: string;
  declare accountId: string | null;
  declare what: 'file' | 'web' | 'full';
  declare deliveryFileId: string | null;
  declare sizeBytes: number;
  declare sentBytes: number;
  declare startedAt: Date;
  declare lastAt: Date;
  declare finishedAt: Date | null;
}
