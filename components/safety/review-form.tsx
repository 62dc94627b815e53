'use client';
import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useForm, useWatch } from 'react-hook-form';
import { reviewReportInput, type ReviewReportInput } from '@/lib/safety/input';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { DateField } from '../ui/date-field';
import { ErrorSummary } from '../ui/error-summary';
import { RadioGroup } from '../ui/radio-group';
import { TextArea } from '../ui/text-area';
import { useToast } from '../ui/toast';

/** How the review ends. What was typed stays when it is refused. */
export function ReviewForm({ id, version, today, holds }: { id: string; version: number; today: string; holds: boolean }) {
  const router = useRouter();
  const { say } = useToast();
  const { register, handleSubmit, control, formState } = useForm<ReviewReportInput>({ resolver: zodResolver(reviewReportInput), shouldUnregister: true, defaultValues: { id, note: '' } });
  const outcome = useWatch({ control, name: 'outcome' });
  const review = useSend<unknown>('POST', `/api/symptoms/${id}/review`, { version });
  const end = async ({ outcome: chosen, note, visitOn }: ReviewReportInput) => {
    await review.mutateAsync({ outcome: chosen, note, ...(chosen === 'unscheduled visit' ? { visitOn } : {}) }).then(
      () => {
        say({ kind: 'fine', word: 'Reviewed.', text: chosen === 'unscheduled visit' ? 'The unscheduled visit stands in the schedule.' : 'The participant’s record carries the outcome.' });
        router.refresh();
      },
      () => undefined,
    );
  };
  return (
    <form noValidate className="mt-4 grid max-w-[620px] gap-5" onSubmit={(event) => void handleSubmit(end)(event)}>
      {review.error ? <ErrorSummary title="Not saved" problems={[{ sentence: review.error.message }]} /> : null}
      <input type="hidden" {...register('id')} value={id} />
      <RadioGroup
        label="How does the review end?"
        choices={[
          { value: 'no action', label: 'No action' },
          { value: 'advice', label: 'Advice' },
          { value: 'unscheduled visit', label: 'Unscheduled visit, to measure both arms' },
          { value: 'adverse event', label: 'Adverse event' },
        ]}
        error={formState.errors.outcome?.message}
        {...register('outcome')}
      />
      {outcome === 'unscheduled visit' ? <DateField label="Day of the unscheduled visit" min={today} error={formState.errors.visitOn?.message} {...register('visitOn', { setValueAs: (text: string) => text || undefined })} /> : null}
      <TextArea label="What was found and agreed" hint="No names." maxLength={1000} error={formState.errors.note?.message} {...register('note')} />
      {holds ? (
        <p className="t-small text-ink-2">Training is held. It is free again with ‘no action’ or ‘advice’; otherwise once both arms were measured.</p>
      ) : null}
      <div>
        <Button kind="primary" type="submit" atWork={review.isPending && 'Saving'}>
          End the review
        </Button>
      </div>
    </form>
  );
}
