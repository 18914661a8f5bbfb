import { Model } from 'objection';

/** A mail in the outbox. */
export class Mail extends Model {
  static override tableName = 'mails';

  declare id: string;
  declare studioId: string | null;
  declare commissionId: string | null;
  declare accountId: string | null;
  declare kind: string;
  declare toAddress: string;
  declare toName: string;
  declare fromName: string;
  declare replyTo: string | null;
  declare subject: string;
  declare text: string;
  declare html: string;
  declare state: 'waiting' | 'handing-over' | 'sent' | 'failed' | 'unsure' | 'withdrawn';
  declare attempts: number;
  declare problem: string | null;
  declare createdAt: Date;
  declare handedOverAt: Date | null;
  declare sentAt: Date | null;
}
