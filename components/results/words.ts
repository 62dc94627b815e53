import { lowerFirst } from '@/instruments/words';
import { formatCount, formatLimits, formatPercent } from '../ui/format';

/** '38'; nothing is said of a count that is not shown: it may be small, or tell a small one by subtraction. */
export const countWords = (count: number | null): string => (count === null ? 'not shown' : formatCount(count));

/** '9.1 %', or why there is none. */
export const shareWords = (share: number | null, reason: string | null): string => (share === null ? (reason ?? 'none yet') : formatPercent(share));

/** '5.0 to 16.4'; nothing where limits do not exist. */
export const limitWords = (lower: number | null, upper: number | null): string => (lower === null || upper === null ? '' : formatLimits(lower, upper));

/** '55 not eligible, 12 no time'. */
export const reasonWords = (reasons: readonly { reason: string; count: number | null }[]): string =>
  reasons.map(({ reason, count }) => `${countWords(count)} ${lowerFirst(reason)}`).join(', ');
