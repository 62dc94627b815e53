'use client';
import { Button, ButtonLink } from '@/components/ui/button';
import { PlainShell } from '@/components/shell/plain-shell';
import { PageHead } from '@/components/ui/page';

/** A fault of ours: what was saved is safe, and the reference is in the log too. */
export default function ErrorPage({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <PlainShell>
      <PageHead title="Something went wrong on our side" lede="What you saved before is safe. Try again; if it stays, tell your administrator the reference." />
      {error.digest ? <p className="t-small mt-3">Reference {error.digest}</p> : null}
      <div className="mt-6 flex flex-wrap gap-3.5">
        <Button onClick={reset}>Try again</Button>
        <ButtonLink href="/">Go to your start page</ButtonLink>
      </div>
    </PlainShell>
  );
}
