import { StudioRow } from './StudioRow.ts';

/** The link by which whoever has it may look at a sheet. A sheet has one at a time; those that were withdrawn stay as rows. */
export class OpenLink extends StudioRow {
  static override tableName = 'openLinks';

  declare sheetId: string;
  declare tokenHash: string;
  /** See features/open-links/sealed-token.ts; null once it is withdrawn. */
  declare sealedToken: string | null;
  declare passphraseHash: string | null;
  /** Counts up with every new passphrase. */
  declare round: number;
  /** "2026-11-17", the last day in the studio's time zone; null: it ends with the sheet. */
  declare endsOn: string | null;
  declare endsAt: Date | null;
  declare createdBy: string | null;
  declare createdAt: Date;
  declare withdrawnAt: Date | null;
}
