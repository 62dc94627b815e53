import type { TrailFilter } from '@/lib/audit/input';
import { formatDate } from '../ui/format';
import { ChoiceInSentence, ValueInSentence } from '../ui/in-sentence';
import type { Choice } from '../ui/select';

export interface TrailFilterSentenceProps {
  filter: TrailFilter;
  change: (part: Partial<TrailFilter>) => void;
  acts: readonly Choice[];
  tables: readonly Choice[];
  /** '214 found'. */
  found: string;
}

/** The browser's own order of day and month can be read two ways; this cannot. */
const inBrackets = (day: string): string => (day ? `(${formatDate(day)}) ` : '');

/** Which entries, in a sentence. */
export function TrailFilterSentence({ filter, change, acts, tables, found }: TrailFilterSentenceProps) {
  const anything = { value: '', label: 'anything' };
  return (
    <p className="t-prose mt-8 mb-2 !text-[19px] !leading-[36px]" role="search" aria-label="Which entries">
      Entries about <ValueInSentence label="participant code" value={filter.code} placeholder="anyone" size={9} onChange={({ target }) => change({ code: target.value })} /> by{' '}
      <ValueInSentence label="person, by code" value={filter.who} placeholder="anyone" size={8} onChange={({ target }) => change({ who: target.value })} />, from{' '}
      <ValueInSentence label="first day" type="date" value={filter.from} onChange={({ target }) => change({ from: target.value })} /> {inBrackets(filter.from)}to{' '}
      <ValueInSentence label="last day" type="date" value={filter.to} onChange={({ target }) => change({ to: target.value })} />
      {filter.to ? ` ${inBrackets(filter.to).trim()}` : ''}, who{' '}
      <ChoiceInSentence label="act" value={filter.act} onChange={({ target }) => change({ act: target.value })} choices={[{ ...anything, label: 'did anything' }, ...acts]} /> to{' '}
      <ChoiceInSentence label="kind of record" value={filter.table} onChange={({ target }) => change({ table: target.value })} choices={[anything, ...tables]} />, column{' '}
      <ValueInSentence label="column, such as body_weight_g" value={filter.field} placeholder="any" size={12} onChange={({ target }) => change({ field: target.value.trim() })} />, newest first.{' '}
      <span className="t-small text-ink-2" role="status">
        {found}
      </span>
    </p>
  );
}
