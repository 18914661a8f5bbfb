import { Model } from 'objection';
import { Account } from './Account.ts';
import { StudioRow } from './StudioRow.ts';

/** An invitation of one person to one sheet. */
export class SheetGuest extends StudioRow {
  static override tableName = 'sheetGuests';
  static override get relationMappings() {
    return {
      account: { relation: Model.BelongsToOneRelation, modelClass: Account, join: { from: 'sheetGuests.accountId', to: 'accounts.id' } },
    };
  }

  declare sheetId: string;
  declare accountId: string;
  declare role: 'lead' | 'reviewer';
  declare name: string;
  declare words: string;
  declare tokenHash: string | null;
  declare invitedBy: string | null;
  declare invitedAt: Date;
  declare firstOpenedAt: Date | null;
  declare lastSeenAt: Date | null;
  declare remindedAt: Date | null;
  declare withdrawnAt: Date | null;
  /** Came by the sheet's open link and confirmed an address; nobody named them. */
  declare byOpenLink: boolean;
  declare account?: Account;
}
