'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { CriterionView } from '@/lib/enrolment/find-screening';
import { ProblemError, send, type ProblemDetails } from '../api/send';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';
import { RadioGroup } from '../ui/radio-group';

export interface EligibilityChecklistProps {
  screeningId: string;
  version: number;
  criteria: readonly CriterionView[];
  mayAnswer: boolean;
  /** Confirming is the site investigator's: the others answer and leave it to them. */
  mayConfirm: boolean;
}

const choices = [
  { value: 'yes', label: 'Yes' },
  { value: 'no', label: 'No' },
] as const;

/** The protocol's criteria, one by one; each answer is saved as it is given. */
export function EligibilityChecklist({ screeningId, version, criteria: given, mayAnswer, mayConfirm }: EligibilityChecklistProps) {
  const router = useRouter();
  const [criteria, setCriteria] = useState(given);
  const [unsaved, setUnsaved] = useState<Readonly<Record<string, string>>>({});
  const [refusal, setRefusal] = useState<ProblemDetails | null>(null);
  const confirming = useSend('POST', `/api/screenings/${screeningId}/confirm`, { version });

  const answer = async (key: string, value: 'yes' | 'no') => {
    const seen = criteria.find((one) => one.key === key)?.version ?? 0;
    const place = (change: Partial<CriterionView>) => setCriteria((all) => all.map((one) => (one.key === key ? { ...one, ...change } : one)));
    place({ answer: value, stops: value !== criteria.find((one) => one.key === key)?.lets });
    setRefusal(null);
    try {
      place(await send<CriterionView>('PUT', `/api/screenings/${screeningId}/answers`, { criterion: key, answer: value }, { version: seen }));
      setUnsaved(({ [key]: _saved, ...rest }) => rest);
    } catch (error) {
      if (!(error instanceof ProblemError)) throw error;
      setUnsaved((all) => ({ ...all, [key]: error.problem.detail }));
    }
  };
  const confirm = () => confirming.mutate({}, { onSuccess: () => router.refresh(), onError: ({ problem }) => setRefusal(problem) });
  const answered = criteria.filter(({ answer: value }) => value !== null).length;
  return (
    <div className="mt-3 grid gap-4">
      {refusal ? <ErrorSummary problems={[{ sentence: refusal.detail, ...(refusal.fields?.[0] ? { fieldId: refusal.fields[0].field } : {}) }]} title="Not confirmed" /> : null}
      <ul>
        {criteria.map(({ key, text, lets, answer: value, stops }) => (
          <li key={key} className="border-t border-rule py-3">
            {mayAnswer ? (
              <RadioGroup
                id={`criterion-${key}`}
                name={`criterion-${key}`}
                label={text}
                choices={choices}
                as="line"
                value={value}
                error={unsaved[key] ?? (stops ? `This stops it: the protocol asks for ${lets}.` : undefined)}
                onChange={(event) => void answer(key, event.target.value === 'yes' ? 'yes' : 'no')}
              />
            ) : (
              <p>
                {text}: <b className={stops ? 'is-needs' : undefined}>{value ?? 'not answered'}</b>
              </p>
            )}
          </li>
        ))}
      </ul>
      {mayAnswer ? (
        <div className="flex flex-wrap items-center gap-4">
          {mayConfirm ? (
            <Button kind="primary" atWork={confirming.isPending && 'Confirming'} onClick={confirm}>
              Confirm eligibility
            </Button>
          ) : null}
          <p role="status" className="t-small text-ink-2">
            {answered} of {criteria.length} answered. Each answer is saved as it is given.{mayConfirm ? '' : ' The site investigator confirms eligibility on this page.'}
          </p>
        </div>
      ) : null}
    </div>
  );
}
