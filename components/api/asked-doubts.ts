import type { ProblemDetails } from './send';

/** A doubt that the server asks about before it saves: which check, at which place, in which words. */
export interface AskedDoubt {
  readonly field: string;
  readonly check: string;
  readonly place: string;
  readonly sentence: string;
}

const doubtField = /^keep (\S+) (.+)$/;

/** The doubts in a refusal, in their order; other problems are left to the form. */
export const askedDoubts = (problem: Pick<ProblemDetails, 'fields'> | null | undefined): AskedDoubt[] =>
  (problem?.fields ?? []).flatMap(({ field, sentence }) => {
    const [, check, place] = doubtField.exec(field) ?? [];
    return check && place ? [{ field, check, place, sentence }] : [];
  });

/** Reasons typed under the doubts' fields, as the record keeps them; a reason too short to say anything is not sent. */
export const keptOf = (reasons: Readonly<Record<string, string>>): { check: string; place: string; reason: string }[] =>
  Object.entries(reasons).flatMap(([field, reason]) => {
    const [, check, place] = doubtField.exec(field) ?? [];
    return check && place && reason.trim().length >= 3 ? [{ check, place, reason: reason.trim() }] : [];
  });
