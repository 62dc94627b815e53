'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { ProblemError, send } from '../api/send';
import { PlainShell } from '../shell/plain-shell';
import { Button, ButtonLink } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';
import { PageHead } from '../ui/page';

/** Before the tablet changes hands: from here on this session reaches one consent and nothing else, until its owner takes it back. */
export function HandOver({ screeningId, siteName }: { screeningId: string; siteName: string }) {
  const router = useRouter();
  const [refusal, setRefusal] = useState<string | null>(null);
  const [handing, setHanding] = useState(false);
  const hand = async () => {
    setHanding(true);
    try {
      await send('POST', '/api/session/hand-over', { screeningId });
      router.refresh();
    } catch (error) {
      setRefusal(error instanceof ProblemError ? error.message : 'Not handed over. Try again.');
      setHanding(false);
    }
  };
  return (
    <PlainShell narrow>
      <PageHead
        title="Hand the tablet over"
        lede={`From now on this tablet shows the consent form and nothing else. ${siteName} takes it back with your password.`}
      />
      <div className="mt-6 grid gap-4">
        {refusal ? <ErrorSummary problems={[{ sentence: refusal }]} title="Not handed over" /> : null}
        <Button kind="primary" size="phone" wide atWork={handing && 'Opening the form'} onClick={() => void hand()}>
          Open the form and hand over
        </Button>
        <ButtonLink href={`/screening/${screeningId}`} kind="link">
          Not yet
        </ButtonLink>
      </div>
    </PlainShell>
  );
}
