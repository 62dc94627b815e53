'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { correctIdentityInput } from '@/lib/enrolment/input';
import type { IdentityView } from '@/lib/enrolment/view-identity';
import { listProblems, placeRefusal } from '../api/form-problems';
import { rawResolver } from '../api/raw-resolver';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';
import { formatDate } from '../ui/format';
import { ReasonDialog } from '../ui/reason-dialog';
import { IdentityFields, type IdentityTyped } from './identity-fields';

const input = correctIdentityInput.omit({ id: true, reason: true });

export interface IdentityFormProps {
  screeningId: string;
  identity: IdentityView;
  today: string;
}

/** Name and contact, with a way to correct them. They never leave the site. */
export function IdentityForm({ screeningId, identity, today }: IdentityFormProps) {
  const [editing, setEditing] = useState(false);
  if (editing) return <Correct {...{ screeningId, identity, today }} onDone={() => setEditing(false)} />;
  const lines: readonly [string, string | null][] = [
    ['Name', identity.name],
    ['E-mail', identity.email],
    ['Phone', identity.phone],
    ['Date of birth', identity.bornOn ? formatDate(identity.bornOn) : null],
  ];
  return (
    <>
      <dl className="mt-2 grid gap-2">
        {lines.map(([term, value]) => (
          <div key={term}>
            <dt className="t-small text-ink-2">{term}</dt>
            <dd className="break-words">{value ?? 'Not given'}</dd>
          </div>
        ))}
      </dl>
      <p className="t-small mt-2 text-ink-2">Seen by this site only. That you read it is in the audit trail.</p>
      <p className="mt-2">
        <Button kind="link" onClick={() => setEditing(true)}>
          Correct name or contact
        </Button>
      </p>
    </>
  );
}

function Correct({ screeningId, identity, today, onDone }: IdentityFormProps & { onDone: () => void }) {
  const router = useRouter();
  const { register, handleSubmit, setError, formState } = useForm<IdentityTyped>({
    resolver: rawResolver(input),
    defaultValues: { name: identity.name, email: identity.email ?? '', phone: identity.phone ?? '', bornOn: identity.bornOn ?? '' },
  });
  const [asking, setAsking] = useState<IdentityTyped | null>(null);
  const saving = useSend<unknown, IdentityTyped & { reason?: string }>('PUT', `/api/screenings/${screeningId}/identity`, { version: identity.version });
  const keep = (typed: IdentityTyped & { reason?: string }) =>
    saving.mutate(typed, {
      onSuccess: () => {
        router.refresh();
        onDone();
      },
      onError: ({ problem }) => {
        setAsking(null);
        placeRefusal(problem, setError, ['name', 'email', 'phone', 'bornOn']);
      },
    });
  const save = handleSubmit((typed) => (identity.needsReason ? setAsking(typed) : keep(typed)));
  return (
    <>
      <form noValidate className="mt-2 grid gap-4" onSubmit={(event) => void save(event)}>
        <ErrorSummary problems={listProblems(formState.errors, saving.error?.problem ?? null)} />
        <IdentityFields register={register} errors={formState.errors} today={today} />
        <div className="flex gap-3">
          <Button kind="primary" type="submit" atWork={saving.isPending && 'Saving'}>
            Save name and contact
          </Button>
          <Button onClick={onDone}>Leave</Button>
        </div>
      </form>
      <ReasonDialog
        open={asking !== null}
        onClose={() => setAsking(null)}
        title="Why do name or contact change?"
        explains="The person has signed under what stands there now."
        confirmLabel="Change"
        keepLabel="Keep what stands there"
        reasons={['Written wrongly', 'The person has changed it']}
        atWork={saving.isPending && 'Changing'}
        onConfirm={({ reason }) => asking && keep({ ...asking, reason })}
      />
    </>
  );
}
