import { PlainShell } from '@/components/shell/plain-shell';
import { ButtonLink } from '@/components/ui/button';
import { PageHead } from '@/components/ui/page';

export default function Forbidden() {
  return (
    <PlainShell>
      <PageHead title="This page is not for your role" lede="You are signed in, but your role does not include what this page shows. Choose another of your roles, or go back." />
      <div className="mt-6">
        <ButtonLink href="/">Go to your start page</ButtonLink>
      </div>
    </PlainShell>
  );
}
