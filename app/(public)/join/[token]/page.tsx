import type { Metadata } from 'next';
import { Providers } from '@/components/api/providers';
import { JoinForm } from '@/components/join/join-form';
import { PlainShell } from '@/components/shell/plain-shell';
import { PageHead } from '@/components/ui/page';
import { viewJoin } from '@/lib/people/join';
import { pageOrigin } from '@/lib/web/origin';
import { Refusal } from '@/lib/work/refusal';

export const metadata: Metadata = { title: 'Choose a password' };

export default async function JoinPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const opened = await viewJoin(token, { from: await pageOrigin() }).catch((error: unknown) => {
    if (error instanceof Refusal) return error.sentence;
    throw error;
  });
  if (typeof opened === 'string')
    return (
      <PlainShell narrow>
        <PageHead title="This link does not open" lede={opened} />
      </PlainShell>
    );
  return (
    <PlainShell narrow>
      <PageHead title="Choose a password" lede={opened.siteName ? `${opened.siteName} has opened your own pages for you.` : 'An account has been made for you.'} />
      <Providers>
        <JoinForm token={token} />
      </Providers>
      <p className="t-small mt-6 text-ink-2">You sign in with the e-mail address this letter came to. The link works once.</p>
    </PlainShell>
  );
}
