'use client';

import { useState } from 'react';
import type { IdentityView } from '@/lib/enrolment/view-identity';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { formatDate } from '../ui/format';

/** Name and contact, asked for on purpose: the reading is written to the audit trail. */
export function RevealIdentity({ code }: { code: string }) {
  const reading = useSend<IdentityView>('POST', `/api/participants/${code}/identity`);
  const [hidden, setHidden] = useState(false);
  const identity = hidden ? undefined : reading.data;
  if (!identity)
    return (
      <>
        <p className="t-small text-ink-2">Seen by this site only. That you read it is kept in the audit trail.</p>
        {reading.error ? (
          <p role="alert" className="is-needs">
            {reading.error.problem.detail}
          </p>
        ) : null}
        <p className="mt-2">
          <Button
            kind="link"
            atWork={reading.isPending && 'Reading'}
            onClick={() => {
              setHidden(false);
              reading.mutate({});
            }}
          >
            Show name and contact
          </Button>
        </p>
      </>
    );
  const { name, phone, email, bornOn } = identity;
  return (
    <>
      <dl className="grid gap-1.5" aria-live="polite">
        {(
          [
            ['Name', name],
            ['Phone', phone],
            ['E-mail', email],
            ['Date of birth', bornOn && formatDate(bornOn)],
          ] as const
        ).map(([term, value]) => (
          <div key={term}>
            <dt className="t-small text-ink-2">{term}</dt>
            <dd className="break-words">{value ?? 'Not given'}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-2">
        <Button kind="link" onClick={() => setHidden(true)}>
          Hide
        </Button>
      </p>
    </>
  );
}
