import { Model, type QueryBuilder, type TransactionOrKnex } from 'objection';
import type { StudioScope } from '../db/scope.ts';

/** A row that belongs to a studio. Reached through a scope, so that the tenant cannot be forgotten. */
export class StudioRow extends Model {
  declare id: string;
  declare studioId: string;

  /** The rows of one studio. An insert through it still has to name the studio. */
  static within<M extends StudioRow>(
    this: { new (): M; query(trx?: TransactionOrKnex): QueryBuilder<M>; tableName: string },
    scope: StudioScope,
    trx?: TransactionOrKnex,
  ): QueryBuilder<M> {
    return this.query(trx).where(`${this.tableName}.studioId`, scope.studioId);
  }
}
