import { Model } from 'objection';

export class Membership extends Model {
  static override tableName = 'memberships';
  static override idColumn = ['studioId', 'accountId'];

  declare studioId: string;
  declare accountId: string;
  declare role: 'owner' | 'assistant';
  declare createdAt: Date;
}
