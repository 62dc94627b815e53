'use client';

import { useRouter } from 'next/navigation';
import { useForm, type FieldErrors, type UseFormRegister } from 'react-hook-form';
import { openScreeningInput } from '@/lib/enrolment/input';
import { listProblems, placeRefusal } from '../api/form-problems';
import { rawResolver } from '../api/raw-resolver';
import { useSend } from '../api/use-send';
import { Button, ButtonLink } from '../ui/button';
import { DateField } from '../ui/date-field';
import { ErrorSummary } from '../ui/error-summary';
import { RadioGroup } from '../ui/radio-group';
import { Select, type Choice } from '../ui/select';
import { TextField } from '../ui/text-field';
import { IdentityFields, type IdentityTyped } from './identity-fields';

interface Typed extends IdentityTyped {
  siteId?: string;
  cohort: string;
  screenedOn: string;
  referredBy: string;
}

export interface OpenScreeningFormProps {
  cohorts: readonly Choice[];
  /** More than one only for somebody who works at several sites. */
  sites: readonly Choice[];
  today: string;
}

const shown = ['name', 'email', 'phone', 'bornOn', 'siteId', 'cohort', 'screenedOn', 'referredBy'] as const;

/** Opens a screening: who, in which cohort, when, and where the person came from. */
export function OpenScreeningForm({ cohorts, sites, today }: OpenScreeningFormProps) {
  const router = useRouter();
  const { register, handleSubmit, setError, formState } = useForm<Typed>({
    resolver: rawResolver(openScreeningInput),
    defaultValues: { name: '', email: '', phone: '', bornOn: '', cohort: '', screenedOn: today, referredBy: '', ...(sites.length > 1 ? { siteId: '' } : {}) },
  });
  const { errors } = formState;
  const opening = useSend<{ id: string }, Typed>('POST', '/api/screenings');
  const open = handleSubmit((typed) =>
    opening.mutate(typed, {
      onSuccess: ({ id }) => router.push(`/screening/${id}`),
      onError: ({ problem }) => placeRefusal(problem, setError, shown),
    }),
  );
  return (
    <form noValidate className="mt-6 grid max-w-xl gap-5" onSubmit={(event) => void open(event)}>
      <ErrorSummary problems={listProblems(errors, opening.error?.problem ?? null)} />
      {sites.length > 1 ? <Select id="siteId" label="Site" none="Choose the site" choices={sites} error={errors.siteId?.message} {...register('siteId')} /> : null}
      <IdentityFields register={register as unknown as UseFormRegister<IdentityTyped>} errors={errors as FieldErrors<IdentityTyped>} today={today} />
      <RadioGroup id="cohort" label="Cohort" choices={cohorts} error={errors.cohort?.message} {...register('cohort')} />
      <DateField id="screenedOn" label="Screened on" max={today} error={errors.screenedOn?.message} {...register('screenedOn')} />
      <TextField id="referredBy" label="Referred by" hint="A clinic or a role, never a patient" optional error={errors.referredBy?.message} {...register('referredBy')} />
      <div className="flex gap-3">
        <Button kind="primary" type="submit" atWork={opening.isPending && 'Opening'}>
          Open the screening
        </Button>
        <ButtonLink href="/screening">Leave</ButtonLink>
      </div>
    </form>
  );
}
