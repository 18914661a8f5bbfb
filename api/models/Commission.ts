import { Model } from 'objection';
import { Client } from './Client.ts';
import { StudioRow } from './StudioRow.ts';
import { View } from './View.ts';

export class Commission extends StudioRow {
  static override tableName = 'commissions';
  static override get relationMappings() {
    return {
      client: { relation: Model.BelongsToOneRelation, modelClass: Client, join: { from: 'commissions.clientId', to: 'clients.id' } },
      views: { relation: Model.HasManyRelation, modelClass: View, join: { from: 'commissions.id', to: 'views.commissionId' } },
    };
  }

  declare clientId: string;
  declare title: string;
  declare brief: string;
  /** "2026-10-28" */
  declare shotOn: string | null;
  declare dueOn: string | null;
  declare allowance: number;
  /** Minor units of `currency`. */
  declare extraPrice: number;
  declare currency: string;
  declare closedAt: Date | null;
  declare deletedAt: Date | null;
  declare version: number;
  declare createdAt: Date;
  declare updatedAt: Date;
  declare client?: Client;
  declare views?: View[];
}
