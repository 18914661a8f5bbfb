import { Model } from 'objection';
import { Membership } from './Membership.ts';

/** A person with an e-mail address: of a studio with a password, or a guest without one. */
export class Account extends Model {
  static override tableName = 'accounts';
  static override get relationMappings() {
    return {
      membership: { relation: Model.HasOneRelation, modelClass: Membership, join: { from: 'accounts.id', to: 'memberships.accountId' } },
    };
  }

  declare id: string;
  declare email: string;
  declare name: string;
  declare passwordHash: string | null;
  declare emailConfirmedAt: Date | null;
  declare shortcuts: boolean;
  declare createdAt: Date;
  declare membership?: Membership;
}
