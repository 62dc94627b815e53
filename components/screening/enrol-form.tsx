'use client';

import { useRouter } from 'next/navigation';
import { useForm } from 'react-hook-form';
import { axillaryProcedures, enrolInput, radiotherapies, surgeries, systemicTherapies } from '@/lib/enrolment/input';
import { listProblems, placeRefusal } from '../api/form-problems';
import { rawResolver } from '../api/raw-resolver';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { DateField } from '../ui/date-field';
import { ErrorSummary } from '../ui/error-summary';
import { NumberField } from '../ui/number-field';
import { RadioGroup } from '../ui/radio-group';
import { Select } from '../ui/select';
import { useToast } from '../ui/toast';

const input = enrolInput.omit({ id: true });
const shown = ['affectedSide', 'dominantSide', 'surgeryOn', 'surgery', 'axillaryProcedure', 'nodesRemoved', 'radiotherapy', 'systemicTherapy', 'heightCm'] as const;
type Typed = Record<(typeof shown)[number], string>;
const empty: Typed = { affectedSide: '', dominantSide: '', surgeryOn: '', surgery: '', axillaryProcedure: '', nodesRemoved: '', radiotherapy: '', systemicTherapy: '', heightCm: '' };

const sides = [
  { value: 'left', label: 'Left' },
  { value: 'right', label: 'Right' },
];

/** The fixed facts of a participant, and the step that issues the code. */
export function EnrolForm({ screeningId, today }: { screeningId: string; today: string }) {
  const router = useRouter();
  const { say } = useToast();
  const { register, handleSubmit, setError, formState } = useForm<Typed>({ resolver: rawResolver(input), defaultValues: empty });
  const { errors } = formState;
  const enrolling = useSend<{ code: string }, Typed>('POST', `/api/screenings/${screeningId}/enrol`);
  const enrol = handleSubmit((typed) =>
    enrolling.mutate(typed, {
      onSuccess: ({ code }) => {
        say({ kind: 'fine', word: `Enrolled as ${code}.`, text: 'The schedule is laid out and the invitation is on its way.' });
        router.refresh();
      },
      onError: ({ problem }) => placeRefusal(problem, setError, shown),
    }),
  );
  return (
    <form noValidate className="mt-4 grid max-w-xl gap-5" onSubmit={(event) => void enrol(event)}>
      <ErrorSummary problems={listProblems(errors, enrolling.error?.problem ?? null)} />
      <RadioGroup id="affectedSide" label="Affected side" choices={sides} error={errors.affectedSide?.message} {...register('affectedSide')} />
      <RadioGroup id="dominantSide" label="Dominant hand" choices={[...sides, { value: 'both', label: 'Both alike' }]} error={errors.dominantSide?.message} {...register('dominantSide')} />
      <DateField id="surgeryOn" label="Date of surgery" hint="The last one on the affected side" max={today} error={errors.surgeryOn?.message} {...register('surgeryOn')} />
      <Select id="surgery" label="Surgery" none="Choose the surgery" choices={surgeries} error={errors.surgery?.message} {...register('surgery')} />
      <Select id="axillaryProcedure" label="Axillary procedure" none="Choose the procedure" choices={axillaryProcedures} error={errors.axillaryProcedure?.message} {...register('axillaryProcedure')} />
      <NumberField id="nodesRemoved" label="Nodes removed" unit="" error={errors.nodesRemoved?.message} {...register('nodesRemoved')} />
      <Select id="radiotherapy" label="Radiotherapy" none="Choose the radiotherapy" choices={radiotherapies} error={errors.radiotherapy?.message} {...register('radiotherapy')} />
      <Select id="systemicTherapy" label="Systemic therapy" none="Choose the systemic therapy" choices={systemicTherapies} error={errors.systemicTherapy?.message} {...register('systemicTherapy')} />
      <NumberField id="heightCm" label="Height" unit="cm" error={errors.heightCm?.message} {...register('heightCm')} />
      <div>
        <Button kind="primary" type="submit" atWork={enrolling.isPending && 'Enrolling'}>
          Enrol and send the invitation
        </Button>
      </div>
    </form>
  );
}
