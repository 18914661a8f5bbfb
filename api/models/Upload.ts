import { StudioRow } from './StudioRow.ts';

export class Upload extends StudioRow {
  static override tableName = 'uploads';

  declare commissionId: string;
  declare purpose: 'frame' | 'final';
  declare state: 'receiving' | 'checking' | 'done' | 'failed' | 'cancelled';
  declare originalName: string;
  declare name: string;
  declare sizeBytes: number;
  declare partSize: number;
  declare sha256: string;
  declare lastModified: Date | null;
  declare storageKey: string;
  declare multipartId: string | null;
  declare problem: string | null;
  declare frameId: string | null;
  declare createdBy: string | null;
  declare createdAt: Date;
  declare updatedAt: Date;
}
