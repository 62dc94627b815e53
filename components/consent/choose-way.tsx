'use client';

import { useRouter } from 'next/navigation';
import type { ConsentMode } from '@/lib/consent/input';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';

const ways: readonly { mode: ConsentMode; verb: string; text: string }[] = [
  { mode: 'tablet', verb: 'Read on the clinic’s tablet', text: 'The person reads and signs here; you hand the tablet over and take it back.' },
  { mode: 'home', verb: 'Send a link to read at home', text: 'A link for 14 days goes to the e-mail address; the person reads in their own time and signs there.' },
  { mode: 'paper', verb: 'Use the paper form', text: 'The person signs on paper; you add the signed form as PDF, JPEG or PNG.' },
];

export interface ChooseWayProps {
  screeningId: string;
  /** The way that is open now; the others remain open until it is signed. */
  current: ConsentMode | null;
}

/** Three ways to consent, at any point before signing; what was read stays read. */
export function ChooseWay({ screeningId, current }: ChooseWayProps) {
  const router = useRouter();
  const starting = useSend<unknown, { mode: ConsentMode }>('POST', `/api/screenings/${screeningId}/consents`);
  const choose = (mode: ConsentMode) =>
    starting.mutate({ mode }, { onSuccess: () => (mode === 'tablet' ? router.push(`/screening/${screeningId}/consent`) : router.refresh()) });
  const refusal = starting.error?.problem;
  return (
    <div className="mt-3 grid gap-3">
      {refusal ? <ErrorSummary problems={[{ sentence: refusal.detail }]} title="Not begun" /> : null}
      <ul>
        {ways
          .filter(({ mode }) => mode !== current)
          .map(({ mode, verb, text }) => (
            <li key={mode} className="grid gap-1 border-t border-rule py-3 sm:grid-cols-[1fr_auto] sm:items-center sm:gap-6">
              <p className="text-ink-2">{text}</p>
              <Button atWork={starting.isPending && starting.variables.mode === mode && 'Beginning'} onClick={() => choose(mode)}>
                {verb}
              </Button>
            </li>
          ))}
      </ul>
    </div>
  );
}
