import { ApiProblem } from '../../lib/api.ts';

/** What a form says after it was refused: the server's words at a field, and those that belong to none. */
export function formProblem(error: Error | null): { at: (path: string) => string | undefined; general: string | undefined } {
  const errors = error instanceof ApiProblem ? error.errors : [];
  return {
    at: (path) => errors.find((one) => one.path === path)?.message,
    general: error && errors.length === 0 ? error.message : undefined,
  };
}
