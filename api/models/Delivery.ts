import { Model } from 'objection';
import { Archive } from './Archive.ts';
import { DeliveryFile } from './DeliveryFile.ts';
import { DeliveryRecipient } from './DeliveryRecipient.ts';
import { StudioRow } from './StudioRow.ts';

/** Finals handed over to named recipients. */
export class Delivery extends StudioRow {
  static override tableName = 'deliveries';
  static override get relationMappings() {
    return {
      files: { relation: Model.HasManyRelation, modelClass: DeliveryFile, join: { from: 'deliveries.id', to: 'deliveryFiles.deliveryId' } },
      recipients: {
        relation: Model.HasManyRelation,
        modelClass: DeliveryRecipient,
        join: { from: 'deliveries.id', to: 'deliveryRecipients.deliveryId' },
      },
      archives: { relation: Model.HasManyRelation, modelClass: Archive, join: { from: 'deliveries.id', to: 'archives.deliveryId' } },
    };
  }

  declare commissionId: string;
  declare number: number;
  declare words: string;
  /** "2027-02-24", the last day in the studio's time zone. */
  declare fetchBy: string;
  declare endsAt: Date;
  declare sentAt: Date | null;
  declare withdrawnAt: Date | null;
  declare idempotencyKey: string | null;
  declare version: number;
  declare createdBy: string | null;
  declare createdAt: Date;
  declare files?: DeliveryFile[];
  declare recipients?: DeliveryRecipient[];
  declare archives?: Archive[];
}
