'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { signIn } from 'next-auth/react';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { joinInput } from '@/lib/people/input';
import { listProblems, placeRefusal } from '../api/form-problems';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';
import { PasswordField } from '../ui/password-field';

const input = z.object({ password: joinInput.shape.password });

/** Chooses a password and signs in. The rule is said before typing; nothing is used up by looking at the page. */
export function JoinForm({ token }: { token: string }) {
  const [entering, setEntering] = useState(false);
  const { register, handleSubmit, setError, formState } = useForm<{ password: string }>({ resolver: zodResolver(input), defaultValues: { password: '' } });
  const joining = useSend<{ email: string }, { token: string; password: string }>('POST', '/api/join');
  const goIn = async (email: string, password: string) => {
    setEntering(true);
    const answer = await signIn('credentials', { email, password, redirect: false }).catch(() => null);
    // The password is set all the same: without a connection the sign-in page takes it.
    window.location.assign(answer?.ok && !answer.error ? '/' : '/sign-in');
  };
  const join = handleSubmit(({ password }) => {
    joining.mutate(
      { token, password },
      {
        onSuccess: ({ email }) => void goIn(email, password),
        onError: ({ problem }) => placeRefusal(problem, setError, ['password']),
      },
    );
  });
  return (
    <form noValidate className="mt-6 grid gap-5" onSubmit={(event) => void join(event)}>
      <ErrorSummary problems={listProblems(formState.errors, joining.error?.problem ?? null)} />
      <PasswordField
        id="password"
        label="Your password"
        hint="At least 12 characters. A few unrelated words in a row are easy to remember and hard to guess; spaces are welcome."
        autoComplete="new-password"
        error={formState.errors.password?.message}
        {...register('password')}
      />
      <Button kind="primary" size="phone" wide type="submit" atWork={(joining.isPending || entering) && 'Setting the password'}>
        Set the password and go in
      </Button>
    </form>
  );
}
