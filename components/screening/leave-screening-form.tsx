'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { leaveScreeningInput, notEnrolledReasons } from '@/lib/enrolment/input';
import { listProblems, placeRefusal } from '../api/form-problems';
import { rawResolver } from '../api/raw-resolver';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { Dialog } from '../ui/dialog';
import { ErrorSummary } from '../ui/error-summary';
import { Select } from '../ui/select';
import { TextArea } from '../ui/text-area';

const input = leaveScreeningInput.omit({ id: true });
const reasons = notEnrolledReasons.map((reason) => ({ value: reason, label: reason }));

/** Ends a screening without enrolment, with a reason for the participant flow. It cannot be undone, so it is asked. */
export function LeaveScreeningForm({ screeningId, version }: { screeningId: string; version: number }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const { register, handleSubmit, setError, formState } = useForm<{ notEnrolledReason: string; note: string }>({
    resolver: rawResolver(input),
    defaultValues: { notEnrolledReason: '', note: '' },
  });
  const leaving = useSend('POST', `/api/screenings/${screeningId}/leave`, { version });
  const leave = handleSubmit((typed) =>
    leaving.mutate(typed, {
      onSuccess: () => {
        setOpen(false);
        router.refresh();
      },
      onError: ({ problem }) => placeRefusal(problem, setError, ['notEnrolledReason', 'note']),
    }),
  );
  return (
    <>
      <Button onClick={() => setOpen(true)}>End without enrolment</Button>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title="End this screening without enrolment?"
        actions={
          <>
            <Button kind="risk" atWork={leaving.isPending && 'Ending'} onClick={() => void leave()}>
              End the screening
            </Button>
            <Button onClick={() => setOpen(false)}>Go on screening</Button>
          </>
        }
      >
        <form noValidate className="grid gap-4" onSubmit={(event) => void leave(event)}>
          <ErrorSummary problems={listProblems(formState.errors, leaving.error?.problem ?? null)} />
          <Select id="notEnrolledReason" label="Reason" none="Choose the reason" choices={reasons} error={formState.errors.notEnrolledReason?.message} {...register('notEnrolledReason')} />
          <TextArea id="note" label="Note" hint="Nothing that names the person" optional error={formState.errors.note?.message} {...register('note')} />
        </form>
      </Dialog>
    </>
  );
}
