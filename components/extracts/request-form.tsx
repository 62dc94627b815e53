'use client';

import { useRouter } from 'next/navigation';
import { useTransition } from 'react';
import { useForm } from 'react-hook-form';
import { requestExtractInput, type Profile } from '@/lib/extracts/input';
import { listProblems, placeRefusal } from '../api/form-problems';
import { rawResolver } from '../api/raw-resolver';
import { useSend } from '../api/use-send';
import { Button, ButtonLink } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';
import { ChoiceInSentence } from '../ui/in-sentence';
import { TextArea } from '../ui/text-area';
import { TextField } from '../ui/text-field';

const profileChoices = [
  { value: 'open', label: 'open' },
  { value: 'controlled', label: 'controlled' },
];

/** Which profile the page previews and the form asks for; chosen in the sentence. */
export function ProfileSentence({ profile, people }: { profile: Profile; people: number }) {
  const router = useRouter();
  const [isWaiting, begin] = useTransition();
  return (
    <span aria-busy={isWaiting}>
      Everyone who agreed to sharing, {people} {people === 1 ? 'person' : 'people'}, under the{' '}
      <ChoiceInSentence label="profile" value={profile} choices={profileChoices} onChange={(event) => begin(() => router.replace(`/extracts/new?profile=${event.target.value}`, { scroll: false }))} /> profile.
    </span>
  );
}

interface Typed {
  profile: Profile;
  purpose: string;
  recipient: string;
}

const shown = ['purpose', 'recipient'] as const;

/** Asks for the data set: what for, and for whom. Pressed twice it is asked for once. */
export function RequestForm({ profile }: { profile: Profile }) {
  const router = useRouter();
  const { register, handleSubmit, setError, formState } = useForm<Typed>({ resolver: rawResolver(requestExtractInput), values: { profile, purpose: '', recipient: '' }, resetOptions: { keepDirtyValues: true } });
  const { errors } = formState;
  const asking = useSend<{ id: string }, Typed>('POST', '/api/extracts');
  const ask = handleSubmit((typed) =>
    asking.mutate(
      { ...typed, profile },
      { onSuccess: ({ id }) => router.push(`/extracts/${id}`), onError: ({ problem }) => placeRefusal(problem, setError, shown) },
    ),
  );
  return (
    <form noValidate className="mt-6 grid max-w-2xl gap-5" onSubmit={(event) => void ask(event)}>
      <ErrorSummary problems={listProblems(errors, asking.error?.problem ?? null)} />
      <TextArea id="purpose" label="Purpose" hint="The question the data are for, without anybody’s name. It stays in the ledger." rows={3} error={errors.purpose?.message} {...register('purpose')} />
      <TextField id="recipient" label="Recipient" hint="Who receives the files: a role, a group or an institution" error={errors.recipient?.message} {...register('recipient')} />
      <div className="flex flex-wrap gap-3">
        <Button kind="primary" type="submit" atWork={asking.isPending && 'Asking'}>
          Ask for the {profile} extract
        </Button>
        <ButtonLink href="/extracts">Leave</ButtonLink>
      </div>
    </form>
  );
}
