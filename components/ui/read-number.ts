/** What a typed figure means. */
export type NumberRead = { kind: 'empty' } | { kind: 'number'; value: number } | { kind: 'unclear'; sentence: string };

/**
 * Reads a figure as people type it: '71.4', '71,4' and '−2' are numbers, and
 * spaces between digits are only spacing. '1,234' is unclear, since it is 1.234
 * to one reader and 1234 to another; words and units are unclear too.
 */
export function readNumber(text: string): NumberRead {
  const bare = text.replace(/[\s\u2009\u202f]/g, '').replace('\u2212', '-');
  if (bare === '') return { kind: 'empty' };
  if (/^-?\d+,\d{3}$/.test(bare))
    return { kind: 'unclear', sentence: `${text.trim()} can be read in two ways. Use a point for decimals and no comma.` };
  const pointed = bare.replace(',', '.');
  if (!/^-?(\d+\.?\d*|\.\d+)$/.test(pointed))
    return { kind: 'unclear', sentence: `${text.trim()} is not a figure. Give digits only, as 71.4.` };
  return { kind: 'number', value: Number(pointed) };
}
