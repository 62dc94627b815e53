'use client';
import { signOut } from 'next-auth/react';
import { useRouter } from 'next/navigation';
import { useId, useState } from 'react';
import { ProblemError, send } from '../api/send';
import { Button } from '../ui/button';
import { useToast } from '../ui/toast';

export interface HeldRole {
  readonly id: string;
  readonly name: string;
  readonly label: string;
  readonly where: string;
}

/** Under role and code: another role of the same person, and the way out. */
export function AccountMenu({ current, grants }: { current: string; grants: readonly HeldRole[] }) {
  const router = useRouter();
  const { say } = useToast();
  const [leaving, setLeaving] = useState(false);
  const fieldId = useId();
  const choose = async (grantId: string) => {
    try {
      await send('POST', '/api/session/role', { grantId });
      router.push('/');
      router.refresh();
    } catch (error) {
      say({
        kind: 'needs',
        word: 'Not changed.',
        text: error instanceof ProblemError ? error.message : 'The role was not changed. Try again.',
      });
    }
  };
  const leave = async () => {
    setLeaving(true);
    await signOut({ callbackUrl: '/sign-in' });
  };
  return (
    <div className="flex flex-wrap items-center gap-3">
      {grants.length > 1 ? (
        <>
          <label className="sr-only" htmlFor={fieldId}>
            Role in use
          </label>
          <select id={fieldId} className="in-sentence text-[13.5px]" value={current} onChange={(event) => void choose(event.target.value)}>
            {grants.map(({ id, name, label, where }) => (
              <option key={id} value={id}>
                {`${name} ${label}, ${where}`}
              </option>
            ))}
          </select>
        </>
      ) : null}
      <Button kind="link" atWork={leaving && 'Signing out'} onClick={() => void leave()}>
        Sign out
      </Button>
    </div>
  );
}
