import '@/instruments/schema-words';
import type { FieldErrors, FieldValues, Path, UseFormSetError } from 'react-hook-form';
import type { Problem } from '../ui/error-summary';
import type { ProblemDetails } from './send';

/** What stands in the way of a form, in the order of its fields. Each field's control has the field's name as its id. */
export function listProblems<V extends FieldValues>(errors: FieldErrors<V>, refusal: ProblemDetails | null): Problem[] {
  const atFields = Object.entries(errors).flatMap(([name, error]) => {
    const sentence = (error as { message?: unknown } | undefined)?.message;
    return typeof sentence === 'string' ? [{ fieldId: name, sentence }] : [];
  });
  if (!refusal || (refusal.fields?.length && atFields.length > 0)) return atFields;
  return [...atFields, { sentence: refusal.detail }];
}

/** Puts what the server refused at its fields; a field the form does not show is left to the summary. */
export function placeRefusal<V extends FieldValues>(refusal: ProblemDetails, setError: UseFormSetError<V>, shown: readonly Path<V>[]): void {
  for (const { field, sentence } of refusal.fields ?? []) {
    const name = shown.find((one) => one === field);
    if (name) setError(name, { type: 'server', message: sentence });
  }
}
