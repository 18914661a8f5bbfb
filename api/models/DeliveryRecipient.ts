import { Model } from 'objection';
import { Account } from './Account.ts';
import { StudioRow } from './StudioRow.ts';

export class DeliveryRecipient extends StudioRow {
  static override tableName = 'deliveryRecipients';
  static override get relationMappings() {
    return {
      account: {
        relation: Model.BelongsToOneRelation,
        modelClass: Account,
        join: { from: 'deliveryRecipients.accountId', to: 'accounts.id' },
      },
    };
  }

  declare deliveryId: string;
  declare accountId: string;
  declare name: string;
  declare tokenHash: string | null;
  declare invitedAt: Date | null;
  declare firstOpenedAt: Date | null;
  declare lastSeenAt: Date | null;
  declare withdrawnAt: Date | null;
  declare account?: Account;
}
