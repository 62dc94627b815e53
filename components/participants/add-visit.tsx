'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { addVisitInput } from '@/lib/schedule/input';
import type { VisitView } from '@/lib/schedule/view-visit';
import { listProblems, placeRefusal } from '../api/form-problems';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { Dialog } from '../ui/dialog';
import { ErrorSummary } from '../ui/error-summary';
import { TextArea } from '../ui/text-area';
import { DateField } from '../ui/date-field';

const input = addVisitInput.omit({ code: true });
type Typed = { on: string; why: string };

/** Adds an unscheduled visit, with its day and what it is for, and opens it. */
export function AddVisit({ code, today }: { code: string; today: string }) {
  const [open, setOpen] = useState(false);
  const router = useRouter();
  const { register, handleSubmit, setError, formState } = useForm<Typed>({ resolver: zodResolver(input), defaultValues: { on: today, why: '' } });
  const adding = useSend<VisitView, Typed & { code: string }>('POST', '/api/visits');
  const add = handleSubmit((typed) => {
    adding.mutate(
      { ...typed, code },
      { onSuccess: ({ id }) => router.push(`/participants/${code}/visits/${id}`), onError: ({ problem }) => placeRefusal(problem, setError, ['on', 'why']) },
    );
  });
  return (
    <>
      <Button onClick={() => setOpen(true)}>Record an unscheduled visit</Button>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title={`What is the unscheduled visit of ${code} for?`}
        actions={
          <>
            <Button kind="primary" type="submit" form="add-visit" atWork={adding.isPending && 'Saving'}>
              Record the visit
            </Button>
            <Button onClick={() => setOpen(false)}>Leave it</Button>
          </>
        }
      >
        <form id="add-visit" noValidate className="grid gap-4" onSubmit={(event) => void add(event)}>
          <ErrorSummary problems={listProblems(formState.errors, adding.error?.problem ?? null)} />
          <DateField id="on" label="Day of the visit" error={formState.errors.on?.message} {...register('on')} />
          <TextArea id="why" label="What it is for" hint="Such as: arm fuller since Thursday. No names." error={formState.errors.why?.message} {...register('why')} />
        </form>
      </Dialog>
    </>
  );
}
