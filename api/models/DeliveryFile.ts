import { Model } from 'objection';
import { FinalVersion } from './FinalVersion.ts';
import { StudioRow } from './StudioRow.ts';

export class DeliveryFile extends StudioRow {
  static override tableName = 'deliveryFiles';
  static override get relationMappings() {
    return {
      finalVersion: {
        relation: Model.BelongsToOneRelation,
        modelClass: FinalVersion,
        join: { from: 'deliveryFiles.finalVersionId', to: 'finalVersions.id' },
      },
    };
  }

  declare deliveryId: string;
  declare finalVersionId: string;
  declare position: number;
  /** The name it is downloaded by; distinct within the delivery. */
  declare name: string;
  declare title: string;
  declare finalVersion?: FinalVersion;
}
