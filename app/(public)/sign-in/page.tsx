import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { ArmCoast } from '@/components/public/arm-coast';
import { SignInForm } from '@/components/sign-in/sign-in-form';
import { Brand } from '@/components/shell/brand';
import { PageHead } from '@/components/ui/page';
import { env } from '@/lib/env';
import { demoSignIns } from '@/lib/people/demo-sign-ins';
import { currentSession } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage() {
  if (await currentSession()) redirect('/');
  return (
    <div className="way-in">
      <main id="main" tabIndex={-1}>
        <Brand href="/welcome" />
        <div className="mt-12">
          <PageHead title="Sign in" lede="Staff use the address the study invited. Participants use the address their invitation came to." />
        </div>
        <div className="mt-8">
          <SignInForm demo={env().DEMO ? demoSignIns : []} />
        </div>
        <p className="t-small mt-8 border-t border-rule-2 pt-4 text-ink-2">
          What you do here is kept with your role, the time and the reason. After 30 minutes without work you are asked to sign in again; nothing you saved is lost. A research record: it does not
          diagnose, and it does not prescribe exercise.
        </p>
      </main>
      <div className="way-in-staff" aria-hidden="true" />
      <div className="way-in-art">
        <ArmCoast width={836} height={900} at={[326, 540]} leanDegrees={-58} />
      </div>
    </div>
  );
}
