import type { FieldErrors, FieldPath, FieldValues, UseFormSetError } from 'react-hook-form';
import { ApiProblem } from './problem.ts';

type FormError = { name: string; message: string };

/** Every message of a form with the path of its field (`identity.email`), in the order of the fields. */
export function listErrors(errors: FieldErrors, path: readonly string[] = []): FormError[] {
  return Object.entries(errors).flatMap(([key, error]): FormError[] => {
    if (typeof error !== 'object' || error === null || key === 'ref') return [];
    const here = key === 'root' ? path : [...path, key];
    if ('message' in error && typeof error.message === 'string') {
      return [{ name: here.join('.'), message: error.message }];
    }
    return listErrors(error as FieldErrors, here);
  });
}

/** Puts what the server did not accept beside its fields. What was typed stays as it is. */
export function showFieldErrors<Values extends FieldValues>(
  error: Error,
  setError: UseFormSetError<Values>,
): void {
  if (!(error instanceof ApiProblem)) return;
  error.fieldErrors.forEach(({ field, message }) =>
    setError(field as FieldPath<Values>, { type: 'server', message }),
  );
}
