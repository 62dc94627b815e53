import type { Metadata } from 'next';
import { Providers } from '@/components/api/providers';
import { ConsentReader } from '@/components/consent/consent-reader';
import { PlainShell } from '@/components/shell/plain-shell';
import { PageHead } from '@/components/ui/page';
import { openConsentLink } from '@/lib/consent/open-link';
import { pageOrigin } from '@/lib/web/origin';
import { Refusal } from '@/lib/work/refusal';

export const metadata: Metadata = { title: 'Consent' };

export default async function ConsentLinkPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const opened = await openConsentLink({ token, from: await pageOrigin() }).catch((error: unknown) => {
    if (error instanceof Refusal) return error.sentence;
    throw error;
  });
  if (typeof opened === 'string')
    return (
      <PlainShell narrow>
        <PageHead title="This link does not open" lede={opened} />
      </PlainShell>
    );
  const { id, formNumber, form, sectionsRead, site } = opened;
  return (
    <Providers>
      <ConsentReader consent={{ id, formNumber, form, sectionsRead, site }} invitationToken={token} />
    </Providers>
  );
}
