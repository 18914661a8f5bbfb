import { Model } from 'objection';

/** A single-use token sent by mail; the table holds its SHA-256. */
export class AccountToken extends Model {
  static override tableName = 'accountTokens';

  declare id: string;
  declare purpose: 'reset-password' | 'confirm-email' | 'join-studio' | 'begin-marking';
  declare tokenHash: string;
  declare email: string;
  declare accountId: string | null;
  declare studioId: string | null;
  declare name: string | null;
  /** Of a sign-up with the address of a guest: taken over when the address is confirmed. */
  declare passwordHash: string | null;
  /** Of `begin-marking`: the link by which the person looked when they gave this address. */
  declare openLinkId: string | null;
  declare expiresAt: Date;
  declare usedAt: Date | null;
  declare createdBy: string | null;
  declare createdAt: Date;
}
