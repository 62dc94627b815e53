'use client';
import { signOut } from 'next-auth/react';
import { useRouter } from 'next/navigation';
import { useId, useState } from 'react';
import { ProblemError, send } from '../api/send';
import { sweepUnsent } from '../phone/unsent';
import { deviceShelf } from '../phone/unsent-shelf';
import { Button } from '../ui/button';
import { Dialog } from '../ui/dialog';
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
  const [asksFirst, setAsksFirst] = useState(false);
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
  /** What is unsent on this device goes with the person: asked first, because it is lost. */
  const leave = async (isSure: boolean) => {
    // The way out never waits on the device: where it offers no shelf, nothing is on it.
    const unsent = await deviceShelf.all().catch(() => []);
    if (!isSure && unsent.length > 0) return setAsksFirst(true);
    setAsksFirst(false);
    setLeaving(true);
    if (unsent.length > 0) await sweepUnsent(deviceShelf, null, new Date()).catch(() => []);
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
      <Button kind="link" atWork={leaving && 'Signing out'} onClick={() => void leave(false)}>
        Sign out
      </Button>
      <Dialog
        open={asksFirst}
        onClose={() => setAsksFirst(false)}
        title="Something is not sent yet"
        actions={
          <>
            <Button kind="primary" onClick={() => setAsksFirst(false)}>
              Stay signed in
            </Button>
            <Button onClick={() => void leave(true)}>Remove it and sign out</Button>
          </>
        }
      >
        <p>What you typed is kept on this phone until it is sent. Signing out removes it, because somebody else may use the phone.</p>
      </Dialog>
    </div>
  );
}
