/** The words with a small first letter, for use inside a sentence; the rest stays as written, so that units keep their capitals. */
export const lowerFirst = (words: string): string => words.charAt(0).toLowerCase() + words.slice(1);

/** The words with a capital first letter, as a sentence begins. */
export const upperFirst = (words: string): string => words.charAt(0).toUpperCase() + words.slice(1);
