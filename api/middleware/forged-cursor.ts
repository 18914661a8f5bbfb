import { problem, sqlState } from './problem.ts';

/**
 * Runs a query that goes on behind a cursor. Cursors come back from outside: one that was not made here may hold what the
 * database cannot read as a time, a number or an id (SQLSTATE class 22, data exception), and is refused, not a fault of ours.
 * @throws Problem 422
 */
export async function behindCursor<T>(rows: PromiseLike<T>): Promise<T> {
  try {
    return await rows;
  } catch (error) {
    if (sqlState(error)?.startsWith('22')) throw problem(422, 'This cursor is none of ours. Begin at the first page.');
    throw error;
  }
}
