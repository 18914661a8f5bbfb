import { Model } from 'objection';
import type { CheckThresholds } from '../domain/check-thresholds.ts';
import type { Use } from '../domain/fit-for-use.ts';
import type { WatermarkSettings } from '../domain/watermark-settings.ts';

export class Studio extends Model {
  static override tableName = 'studios';
  static override jsonAttributes = ['watermark', 'checkThresholds', 'uses'];

  declare id: string;
  declare name: string;
  declare replyTo: string;
  declare timeZone: string;
  declare currency: string;
  declare watermark: WatermarkSettings;
  /** From where on frames are pointed out; null: as Oriel has it. */
  declare checkThresholds: CheckThresholds | null;
  /** What pictures are wanted for; null: as Oriel has it. */
  declare uses: Use[] | null;
  declare demoState: 'seeding' | 'ready' | null;
  declare version: number;
  declare createdAt: Date;
}
