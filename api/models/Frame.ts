import { StudioRow } from './StudioRow.ts';

/** One uploaded exposure, with its file untouched. */
export class Frame extends StudioRow {
  static override tableName = 'frames';
  static override jsonAttributes = ['alike'];
  static override modifiers = {
    present: (query: { whereNull(column: string): unknown }) => void query.whereNull('frames.deletedAt'),
  };

  declare commissionId: string;
  declare uploadId: string | null;
  declare viewId: string | null;
  declare bracketId: string | null;
  /** Somebody decided which bracket it belongs to, or that it belongs to none: the machine leaves it alone. */
  declare groupedByHand: boolean;
  declare state: 'reading' | 'ready' | 'failed';
  declare problem: string | null;
  declare originalName: string;
  declare name: string;
  declare mediaType: string;
  declare sizeBytes: number;
  declare sha256: string;
  declare storageKey: string;
  /** Pixels, upright. */
  declare width: number;
  declare height: number;
  /** ThumbHash in base64. */
  declare placeholder: string | null;
  declare recipe: number | null;
  /** Version of the measuring that was done; its outcome is in FrameMeasure, or nothing could be measured. */
  declare measuresRecipe: number | null;
  declare alike: { group: string; count: number; is: 'sharpest' | 'softest' | null } | null;
  /** The camera's wall clock, "2026-10-28T17:06:12.34". */
  declare takenLocal: string | null;
  declare takenOffsetMinutes: number | null;
  declare takenAt: Date | null;
  declare make: string | null;
  declare model: string | null;
  declare lens: string | null;
  declare serial: string | null;
  declare fNumber: number | null;
  /** Seconds. */
  declare exposureTime: number | null;
  declare iso: number | null;
  /** Millimetres. */
  declare focalLength: number | null;
  declare focalLength35: number | null;
  /** EV. */
  declare exposureBias: number | null;
  declare exposureMode: number | null;
  declare orientation: number;
  declare latitude: number | null;
  declare longitude: number | null;
  declare hiddenAt: Date | null;
  declare deletedAt: Date | null;
  declare createdBy: string | null;
  declare createdAt: Date;
}
