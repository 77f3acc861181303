import type { FieldPath, FieldValues, UseFormSetError } from 'react-hook-form';
import { messageOf } from '@/components/ui/ErrorState';
import { ApiProblem } from '@/hooks/api';

/**
 * Puts a refusal's field errors beside their fields; what belongs to no field is kept under `root`.
 * Nothing that was typed is lost.
 */
export function showProblem<T extends FieldValues>(
  error: unknown,
  fields: readonly FieldPath<T>[],
  setError: UseFormSetError<T>,
) {
  const named = error instanceof ApiProblem ? error.errors : [];
  const known = named.filter((fault) => fields.some((field) => field === fault.path));
  for (const fault of known) setError(fault.path as FieldPath<T>, { message: fault.message });
  if (known.length === 0) {
    const rest = named.map((fault) => fault.message).join(' ');
    setError('root', { message: rest ? `${messageOf(error)} ${rest}` : messageOf(error) });
  }
}
