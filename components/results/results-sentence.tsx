'use client';

import { usePathname, useRouter, useSearchParams } from 'next/navigation';
import { useEffect, useOptimistic, useRef, useTransition } from 'react';
import type { ResultsView } from '@/lib/results/view-results';
import { confirmations } from '@/lib/results/input';
import { ChoiceInSentence } from '../ui/in-sentence';

const confirmationWords: Record<(typeof confirmations)[number], string> = { 'first visit': 'at any visit', 'confirmed at the next visit': 'at two scheduled visits in a row' };

/** Who the figures are about and how swelling is counted, edited where it is said. */
export function ResultsSentence({ view }: { view: Pick<ResultsView, 'cohorts' | 'sites' | 'definitions' | 'chosen' | 'confirmation' | 'suppressBelow'> }) {
  const router = useRouter();
  const path = usePathname();
  const asked = useSearchParams();
  const [isWaiting, begin] = useTransition();
  const { cohorts, sites, definitions } = view;
  const [shown, show] = useOptimistic({ ...view.chosen, confirmation: view.confirmation }, (now, part: Record<string, string>) => ({ ...now, ...part }));
  /** Choices made while an earlier one is still being worked out are added to it. */
  const wanted = useRef<URLSearchParams | null>(null);
  useEffect(() => {
    wanted.current = null;
  }, [asked]);
  const choose = (name: string, value: string) => {
    const next = new URLSearchParams(wanted.current ?? asked);
    if (value) next.set(name, value);
    else next.delete(name);
    wanted.current = next;
    begin(() => {
      show({ [name]: value });
      router.replace(`${path}?${next.toString()}`, { scroll: false });
    });
  };
  const definitionChoices = definitions.map(({ code, name }) => ({ value: code, label: name }));
  // One cohort at one site would be few: where small counts are hidden it is one or the other.
  const isFree = view.suppressBelow === 0;
  const whole = sites.length === 1 ? (sites[0]?.name ?? 'the site') : `all ${sites.length} sites`;
  return (
    <span aria-busy={isWaiting} className="results-sentence leading-[2]">
      Everyone with a baseline in{' '}
      {isFree || !shown.siteId ? (
        <ChoiceInSentence label="cohort" value={shown.cohort ?? ''} onChange={(event) => choose('cohort', event.target.value)} choices={[{ value: '', label: 'every cohort' }, ...cohorts.map(({ key, name }) => ({ value: key, label: `‘${name}’` }))]} />
      ) : (
        'every cohort'
      )}{' '}
      at{' '}
      {sites.length > 1 && (isFree || !shown.cohort) ? (
        <ChoiceInSentence label="site" value={shown.siteId ?? ''} onChange={(event) => choose('siteId', event.target.value)} choices={[{ value: '', label: whole }, ...sites.map(({ id, name }) => ({ value: id, label: name }))]} />
      ) : (
        whole
      )}
      , swelling counted by <ChoiceInSentence label="definition A" value={shown.first} onChange={(event) => choose('first', event.target.value)} choices={definitionChoices} /> beside{' '}
      <ChoiceInSentence label="definition B" value={shown.second} onChange={(event) => choose('second', event.target.value)} choices={definitionChoices} />, met{' '}
      <ChoiceInSentence label="confirmation" value={shown.confirmation} onChange={(event) => choose('confirmation', event.target.value)} choices={confirmations.map((value) => ({ value, label: confirmationWords[value] }))} />.{' '}
      <span role="status" className="t-small text-ink-2">
        {isWaiting ? 'Working out the results.' : ''}
      </span>
    </span>
  );
}

/** The browser's own printing; the print style of every page does the rest. */
export function PrintButton() {
  return (
    <button type="button" className="btn" onClick={() => window.print()}>
      <span>Print or save</span>
    </button>
  );
}
