import { type Constructor, Model, type ModelClass, type QueryBuilderType, type TransactionOrKnex } from 'objection';
import type { StudioScope } from '../db/scope.ts';

/** A row that belongs to a studio. Reached through a scope, so that the tenant cannot be forgotten. */
export class StudioRow extends Model {
  declare id: string;
  declare studioId: string;

  /** The rows of one studio. An insert through it still has to name the studio. */
  static within<M extends StudioRow>(this: Constructor<M>, scope: StudioScope, trx?: TransactionOrKnex): QueryBuilderType<M> {
    // The constructor of a model is the model: objection's own static methods are typed by it in the same way.
    const model = this as unknown as ModelClass<M>;
    return model.query(trx).where(`${model.tableName}.studioId`, scope.studioId) as QueryBuilderType<M>;
  }
}
