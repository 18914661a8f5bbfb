import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { ApiProblem } from '../../lib/api.ts';

/**
 * Puts what the server refused where it belongs: a wrong field's sentence below that field, anything else at the form as a whole.
 */
export function landErrors<Values extends FieldValues, Output>(form: UseFormReturn<Values, unknown, Output>, error: unknown): void {
  const wrong = error instanceof ApiProblem ? error.errors : [];
  const known = wrong.filter(({ path }) => path in form.getValues());
  known.forEach(({ path, message }, at) => form.setError(path as Path<Values>, { message }, { shouldFocus: at === 0 }));
  if (known.length === 0)
    form.setError('root', { message: error instanceof ApiProblem ? error.detail : 'This did not work. Please try again.' });
}
