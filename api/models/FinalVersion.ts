import { StudioRow } from './StudioRow.ts';

export class FinalVersion extends StudioRow {
  static override tableName = 'finalVersions';

  declare finalId: string;
  declare uploadId: string | null;
  declare number: number;
  declare originalName: string;
  declare name: string;
  declare mediaType: string;
  declare sizeBytes: number;
  declare sha256: string;
  declare storageKey: string;
  declare width: number;
  declare height: number;
  declare placeholder: string | null;
  declare recipe: number | null;
  declare takenLocal: string | null;
  declare deletedAt: Date | null;
  declare createdBy: string | null;
  declare createdAt: Date;
}
