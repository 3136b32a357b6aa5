import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { ApiError } from './api';

/** Puts the server's field errors beside their fields; answers what is left to say for the form as a whole. */
export function showFieldErrors<Values extends FieldValues>(
  form: Pick<UseFormReturn<Values>, 'setError' | 'getValues'>,
  error: Error,
): string | null {
  const errors = error instanceof ApiError ? (error.problem?.errors ?? []) : [];
  const fields = Object.keys(form.getValues());
  const known = errors.filter(({ pointer }) => fields.includes(pointer.split('/')[1] ?? ''));
  for (const { pointer, detail } of known)
    form.setError(pointer.slice(1).replaceAll('/', '.') as Path<Values>, { message: detail });
  return known.length > 0 ? null : error.message;
}
