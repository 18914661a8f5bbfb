import { expect } from 'vitest';
import type { ZodType } from 'zod';

/** A supertest assertion: the answer's body is what the contract says it is, with no field more and none less. */
export function answers<T>(schema: ZodType<T>): (response: { body: unknown }) => void {
  return ({ body }) => {
    const read = schema.safeParse(body);
    expect(read.success ? undefined : read.error.issues, 'what the contract says of the answer').toBeUndefined();
    // zod drops what a schema does not name, so a field too many shows as a difference.
    expect(body).toEqual(read.data);
  };
}
