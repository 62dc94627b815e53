import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SignInForm } from '@/components/sign-in/sign-in-form';
import { PlainShell } from '@/components/shell/plain-shell';
import { PageHead } from '@/components/ui/page';
import { env } from '@/lib/env';
import { demoSignIns } from '@/lib/people/demo-sign-ins';
import { currentSession } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage() {
  if (await currentSession()) redirect('/');
  return (
    <PlainShell narrow footer={<span>A research record. It does not diagnose, and it does not prescribe exercise.</span>}>
      <PageHead title="Sign in" lede="Staff use the address the study invited. Participants use the address their invitation came to." />
      <div className="mt-8">
        <SignInForm demo={env().DEMO ? demoSignIns : []} />
      </div>
      <p className="t-small mt-8 text-ink-2">
        What you do here is kept with your role, the time and the reason. After 30 minutes without work you are asked to sign in again; nothing you saved is lost.
      </p>
    </PlainShell>
  );
}
