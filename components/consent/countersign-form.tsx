'use client';

import { useRouter } from 'next/navigation';
import { useForm } from 'react-hook-form';
import type { Signer } from '@/lib/consent/find-signer';
import { countersignInput, staffStatement } from '@/lib/consent/input';
import { listProblems, placeRefusal } from '../api/form-problems';
import { rawResolver } from '../api/raw-resolver';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { Checkbox } from '../ui/checkbox';
import { ErrorSummary } from '../ui/error-summary';
import { PasswordField } from '../ui/password-field';
import { TextField } from '../ui/text-field';
import { useToast } from '../ui/toast';

const input = countersignInput.omit({ id: true });

/** The second signature, by the person who took consent, under the name of the account in use. */
export function CountersignForm({ consentId, version, signer }: { consentId: string; version: number; signer: Signer }) {
  const router = useRouter();
  const { say } = useToast();
  const { register, handleSubmit, setError, formState } = useForm<{ agreed: boolean; name: string; password: string }>({ resolver: rawResolver(input), defaultValues: { agreed: false, name: '', password: '' } });
  const signing = useSend('POST', `/api/consents/${consentId}/countersign`, { version });
  const sign = handleSubmit((values) =>
    signing.mutate(values, {
      onSuccess: () => {
        say({ kind: 'fine', word: 'Consent is complete.', text: 'The copy goes to the participant by e-mail.' });
        router.refresh();
      },
      onError: ({ problem }) => placeRefusal(problem, setError, ['agreed', 'name', 'password']),
    }),
  );
  return (
    <form noValidate className="mt-4 grid max-w-xl gap-4" onSubmit={(event) => void sign(event)}>
      <ErrorSummary problems={listProblems(formState.errors, signing.error?.problem ?? null)} />
      <Checkbox id="agreed" label={staffStatement} error={formState.errors.agreed?.message} {...register('agreed')} />
      <TextField id="name" label="Type your full name as your signature" hint={signer.name ? `You are signed in as ${signer.name}, ${signer.label}.` : undefined} autoComplete="name" error={formState.errors.name?.message} {...register('name')} />
      <PasswordField
        id="password"
        label="Your password"
        hint="Signing takes it once more, so that nobody signs in your place."
        autoComplete="current-password"
        error={formState.errors.password?.message}
        {...register('password')}
      />
      <div>
        <Button kind="primary" type="submit" atWork={signing.isPending && 'Signing'}>
          Sign second
        </Button>
      </div>
    </form>
  );
}
