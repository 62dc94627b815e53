'use client';
import { zodResolver } from '@hookform/resolvers/zod';
import { signIn } from 'next-auth/react';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { Button } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';
import { PasswordField } from '../ui/password-field';
import { TextField } from '../ui/text-field';

const signInInput = z.object({
  email: z.email('Write the whole address, as in name@clinic.example.'),
  password: z.string().min(1, 'Write your password.').max(256, 'That is longer than any password here.'),
});

const refusals: Record<string, string> = {
  'too-many': 'Too many tries. Wait 15 minutes, or ask your administrator to help you.',
  CredentialsSignin: 'The address and the password do not match. Check both; capitals count in the password.',
};

/** A demonstration's sign-in: one press fills and sends the form. */
export interface DemoSignIn {
  readonly name: string;
  readonly role: string;
  readonly email: string;
  readonly password: string;
}

/** Address and password. What was typed stays when it is refused. */
export function SignInForm({ demo }: { demo: readonly DemoSignIn[] }) {
  const { register, handleSubmit, formState } = useForm({ resolver: zodResolver(signInInput), defaultValues: { email: '', password: '' } });
  const router = useRouter();
  const [refusal, setRefusal] = useState<string | null>(null);
  const [entering, setEntering] = useState<string | null>(null);

  const enter = async ({ email, password }: z.infer<typeof signInInput>) => {
    setRefusal(null);
    setEntering(email);
    const answer = await signIn('credentials', { email, password, redirect: false }).catch(() => null);
    if (answer?.ok && !answer.error) {
      router.replace('/');
      router.refresh();
      return;
    }
    setEntering(null);
    setRefusal(
      answer
        ? (refusals[answer.error ?? ''] ?? refusals['CredentialsSignin'] ?? '')
        : 'No connection. What you typed is still here; try again when the line is back.',
    );
  };

  return (
    <>
      <form noValidate className="grid gap-5" onSubmit={(event) => void handleSubmit(enter)(event)}>
        {refusal ? <ErrorSummary title="Not signed in" problems={[{ sentence: refusal, fieldId: 'email' }]} /> : null}
        <TextField
          id="email"
          label="E-mail"
          type="email"
          autoComplete="username"
          error={formState.errors.email?.message}
          {...register('email')}
        />
        <PasswordField
          id="password"
          label="Password"
          autoComplete="current-password"
          error={formState.errors.password?.message}
          {...register('password')}
        />
        <Button kind="primary" size="phone" wide type="submit" atWork={entering !== null && 'Signing in'}>
          Sign in
        </Button>
      </form>
      {demo.length > 0 ? <DemoSignIns demo={demo} entering={entering} enter={enter} /> : null}
    </>
  );
}

function DemoSignIns({
  demo,
  entering,
  enter,
}: {
  demo: readonly DemoSignIn[];
  entering: string | null;
  enter: (who: DemoSignIn) => Promise<void>;
}) {
  return (
    <section className="mt-8 border-t border-rule-2 pt-5" aria-labelledby="demo-title">
      <h2 id="demo-title" className="t-small-head">
        Demonstration
      </h2>
      <p className="t-small mt-1 text-ink-2">
        Invented people and data. Press a name to sign in; the password of all is {demo[0]?.password}.
      </p>
      <ul className="mt-3">
        {demo.map((who) => (
          <li key={who.email} className="flex items-baseline justify-between gap-4 border-b border-rule py-2">
            <span className="min-w-0 [overflow-wrap:anywhere]">
              {who.role}
              <span className="block text-[13.5px] text-ink-2">{who.email}</span>
            </span>
            <Button
              kind="link"
              className="shrink-0"
              atWork={entering === who.email && 'Signing in'}
              onClick={() => void enter(who)}
              aria-label={`Sign in as ${who.name}, ${who.role}`}
            >
              {who.name}
            </Button>
          </li>
        ))}
      </ul>
    </section>
  );
}
