'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { ProblemError, send } from '../api/send';
import { PlainShell } from '../shell/plain-shell';
import { Button } from '../ui/button';
import { PageHead } from '../ui/page';
import { PasswordField } from '../ui/password-field';

/** The tablet comes back: only the password of who signed in opens the rest again. */
export function HandBack({ screeningId }: { screeningId: string }) {
  const router = useRouter();
  const [password, setPassword] = useState('');
  const [refusal, setRefusal] = useState<string | null>(null);
  const [taking, setTaking] = useState(false);
  const take = async () => {
    setTaking(true);
    setRefusal(null);
    try {
      await send('POST', '/api/session/take-back', { password });
      router.replace(`/screening/${screeningId}`);
      router.refresh();
    } catch (error) {
      setRefusal(error instanceof ProblemError ? error.message : 'Not taken back. Try again.');
      setTaking(false);
    }
  };
  return (
    <PlainShell narrow>
      <PageHead title="Give the tablet back" lede="Please hand it to the person who gave it to you." />
      <form
        noValidate
        className="mt-6 grid gap-5"
        onSubmit={(event) => {
          event.preventDefault();
          void take();
        }}
      >
        <PasswordField
          id="password"
          label="For the site: your password"
          autoComplete="current-password"
          value={password}
          onChange={(event) => setPassword(event.target.value)}
          error={refusal ?? undefined}
        />
        <Button kind="primary" size="phone" wide type="submit" atWork={taking && 'Taking back'}>
          Take the tablet back
        </Button>
      </form>
    </PlainShell>
  );
}
