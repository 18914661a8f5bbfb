import { StudioRow } from './StudioRow.ts';

/** A zip of a delivery or of picks. */
export class Archive extends StudioRow {
  static override tableName = 'archives';

  declare deliveryId: string | null;
  declare pickListId: string | null;
  declare kind: 'full' | 'web' | 'picks';
  declare state: 'building' | 'ready' | 'failed';
  declare problem: string | null;
  declare name: string;
  declare fileCount: number;
  declare sizeBytes: number | null;
  declare writtenBytes: number;
  declare sha256: string | null;
  declare storageKey: string;
  declare createdAt: Date;
  declare readyAt: Date | null;
}
