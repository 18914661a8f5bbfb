import { Model } from 'objection';
import type { WatermarkSettings } from '../domain/watermark-settings.ts';
import { Commission } from './Commission.ts';
import { Proof } from './Proof.ts';
import { SheetGuest } from './SheetGuest.ts';
import { StudioRow } from './StudioRow.ts';

/** The ordered proofs sent to a client, with a last date and an allowance. Its state is derived, see domain/sheet-state.ts. */
export class Sheet extends StudioRow {
  static override tableName = 'sheets';
  static override jsonAttributes = ['watermark'];
  static override get relationMappings() {
    return {
      commission: {
        relation: Model.BelongsToOneRelation,
        modelClass: Commission,
        join: { from: 'sheets.commissionId', to: 'commissions.id' },
      },
      proofs: { relation: Model.HasManyRelation, modelClass: Proof, join: { from: 'sheets.id', to: 'proofs.sheetId' } },
      guests: { relation: Model.HasManyRelation, modelClass: SheetGuest, join: { from: 'sheets.id', to: 'sheetGuests.sheetId' } },
    };
  }

  declare commissionId: string;
  declare number: number;
  /** "2026-11-17", the last day in the studio's time zone. */
  declare chooseBy: string | null;
  declare endsAt: Date | null;
  declare allowance: number;
  declare extraPrice: number;
  declare currency: string;
  declare watermark: WatermarkSettings;
  declare watermarkHash: string;
  declare issuedAt: Date | null;
  declare withdrawnAt: Date | null;
  declare sentAt: Date | null;
  declare reopenedAt: Date | null;
  declare reopenReason: string | null;
  declare revision: number;
  declare version: number;
  declare createdBy: string | null;
  declare createdAt: Date;
  declare commission?: Commission;
  declare proofs?: Proof[];
  declare guests?: SheetGuest[];
}
