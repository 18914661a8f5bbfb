import { StudioRow } from './StudioRow.ts';

/** Frames of one composition at different exposures, with their merged picture. */
export class Bracket extends StudioRow {
  static override tableName = 'brackets';
  static override jsonAttributes = ['leftOut'];

  declare commissionId: string;
  declare leadFrameId: string;
  declare leadByHand: boolean;
  /** Somebody decided which frames belong to it. */
  declare byHand: boolean;
  declare shows: 'merged' | 'lead';
  /** Names the merged picture that should be there: its frames, their order, the lead and the recipe. */
  declare wanted: string;
  /** The same of the one that is there. */
  declare madeOf: string | null;
  /** Pixels of the largest merged picture. */
  declare width: number | null;
  declare height: number | null;
  /** ThumbHash in base64. */
  declare placeholder: string | null;
  declare leftOut: { frameId: string; why: 'moved' | 'size' }[];
  /** Why the wanted picture cannot be made. */
  declare problem: string | null;
  declare createdAt: Date;
}
