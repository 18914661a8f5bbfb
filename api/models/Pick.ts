import { StudioRow } from './StudioRow.ts';

/** A proof chosen for finishing, as it stood when the list was sent. */
export class Pick extends StudioRow {
  static override tableName = 'picks';
  static override jsonAttributes = ['markedBy'];

  declare pickListId: string;
  declare number: number;
  declare proofId: string;
  declare proofNumber: number;
  declare frameId: string;
  /** All frames of a bracket, darkest first; empty for a single frame. */
  declare frameIds: string[];
  declare frameName: string;
  declare viewId: string | null;
  declare viewTitle: string | null;
  declare extra: boolean;
  declare markedBy: { name: string; initials: string; role: 'lead' | 'reviewer' }[];
}
