import { Model } from 'objection';

/** The hash of a link's token that a newer one has replaced. Written by a trigger. */
export class ReplacedLink extends Model {
  static override tableName = 'replacedLinks';
  static override idColumn = 'tokenHash';

  declare tokenHash: string;
  declare sheetGuestId: string | null;
  declare deliveryRecipientId: string | null;
  declare replacedAt: Date;
}
