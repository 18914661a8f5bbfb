import { Model } from 'objection';
import type { WatermarkSettings } from '../domain/watermark-settings.ts';

export class Studio extends Model {
  static override tableName = 'studios';
  static override jsonAttributes = ['watermark'];

  declare id: string;
  declare name: string;
  declare replyTo: string;
  declare timeZone: string;
  declare currency: string;
  declare watermark: WatermarkSettings;
  declare demoState: 'seeding' | 'ready' | null;
  declare version: number;
  declare createdAt: Date;
}
