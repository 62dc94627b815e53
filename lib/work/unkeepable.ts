/** Said of a character that no text can hold, where it is found: at the edge or in the data base. */
export const unkeepableText = 'A text holds a character that cannot be kept. It is often invisible and comes with pasting: type the text again and save.';
const day = 'A day is not one that can be kept. Look at the dates and save again.';

/**
 * PostgreSQL's words for a value that no column can hold, whatever the form allowed: a null character or half a surrogate
 * pair in a text, an id that is none, a number or a day beyond the calendar (SQLSTATE class 22). A null
 * character ends the message itself, which is a broken protocol (08P01) to the server.
 */
const states: Readonly<Record<string, string>> = {
  '08P01': unkeepableText,
  '22021': unkeepableText,
  '22P05': unkeepableText,
  '22P02': 'A part of this address or form is not what it should be. Go back and open the page again.',
  '22003': 'A number is too large or too small to be kept. Look at the figures and save again.',
  '22007': day,
  '22008': day,
};

/** The sentence for a person when the data base refused a value as such; null for every other error. */
export function unkeepable(error: unknown): string | null {
  const code = error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : '';
  return Object.hasOwn(states, code) ? (states[code] ?? null) : null;
}
