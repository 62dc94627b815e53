'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { axillaryProcedures, radiotherapies, surgeries, systemicTherapies } from '@/lib/enrolment/input';
import type { CorrectFactInput } from '@/lib/participants/input';
import type { ParticipantView } from '@/lib/participants/view-participant';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { DateField } from '../ui/date-field';
import { Dialog } from '../ui/dialog';
import { NumberField } from '../ui/number-field';
import { Select, type Choice } from '../ui/select';
import { TextArea } from '../ui/text-area';
import { useToast } from '../ui/toast';

type Field = CorrectFactInput['field'];

interface Fact {
  readonly label: string;
  /** Closed lists are chosen from; 'date' is a day; a unit stands beside a number. */
  readonly kind: readonly Choice[] | 'date' | { readonly unit: string };
}

const side = [
  { value: 'left', label: 'Left' },
  { value: 'right', label: 'Right' },
];
const facts: Record<Field, Fact> = {
  affected_side: { label: 'Affected side', kind: side },
  dominant_side: { label: 'Dominant hand', kind: [...side, { value: 'both', label: 'Both alike' }] },
  surgery_on: { label: 'Date of surgery', kind: 'date' },
  surgery: { label: 'Surgery', kind: surgeries },
  axillary_procedure: { label: 'Axillary procedure', kind: axillaryProcedures },
  nodes_removed: { label: 'Nodes removed', kind: { unit: '' } },
  radiotherapy: { label: 'Radiotherapy', kind: radiotherapies },
  systemic_therapy: { label: 'Systemic therapy', kind: systemicTherapies },
  height_mm: { label: 'Height', kind: { unit: 'cm' } },
  age_years: { label: 'Age at enrolment', kind: { unit: 'years' } },
};
const isField = (text: string): text is Field => Object.hasOwn(facts, text);

/** One fact, its new value and the reason, in one dialog; an open query about it is answered in the same breath. */
export function CorrectFact({ view }: { view: ParticipantView }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button kind="link" onClick={() => setOpen(true)}>
        Correct a fact
      </Button>
      {open ? <FactDialog view={view} onClose={() => setOpen(false)} /> : null}
    </>
  );
}

function FactDialog({ view, onClose }: { view: ParticipantView; onClose: () => void }) {
  const router = useRouter();
  const { say } = useToast();
  const [field, setField] = useState<string>(view.factQueries.find(({ state }) => state === 'open')?.target.field ?? '');
  const [value, setValue] = useState('');
  const [reason, setReason] = useState('');
  const [tried, setTried] = useState(false);
  const correct = useSend<{ corrected: true }>('POST', `/api/participants/${view.code}/facts`, { version: view.version });
  const refused = correct.error?.problem;
  const at = (name: string) => refused?.fields?.find((one) => one.field === name)?.sentence;
  const query = view.factQueries.find(({ state, target }) => state === 'open' && target.field === field);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    setTried(true);
    if (correct.isPending || !isField(field) || !value.trim() || reason.trim().length < 5) return;
    const done = () => {
      onClose();
      say({ kind: 'fine', word: 'Corrected.', text: 'Results that depend on it were computed anew.' });
      router.refresh();
    };
    correct.mutate({ field, value: value.trim(), reason: reason.trim(), ...(query ? { query: { id: query.id, version: query.version } } : {}) }, { onSuccess: done });
  };
  return (
    <Dialog
      open
      onClose={onClose}
      title={`Which fact of ${view.code} is wrong?`}
      actions={
        <>
          <Button type="submit" form="correct-fact" kind="primary" atWork={correct.isPending ? 'Saving' : false}>
            {query ? 'Correct and answer the query' : 'Correct the fact'}
          </Button>
          <Button onClick={onClose}>Leave them</Button>
        </>
      }
    >
      <p>The old value stays in the trail with your reason. Change and verdicts are computed anew.</p>
      <form id="correct-fact" noValidate onSubmit={submit} className="mt-3 grid gap-3.5">
        <Select
          label="Fact"
          none="Choose the fact"
          choices={Object.entries(facts).map(([name, { label }]) => ({ value: name, label }))}
          value={field}
          error={tried && !field ? 'Choose the fact.' : undefined}
          onChange={(event) => {
            setField(event.target.value);
            setValue('');
          }}
        />
        {query ? <p className="note-by">Asked: “{query.messages.at(-1)?.text}”</p> : null}
        {isField(field) ? <NewFact fact={facts[field]} value={value} error={at('value') ?? (tried && !value.trim() ? 'Give the value.' : undefined)} onValue={setValue} /> : null}
        <TextArea
          label="Reason"
          hint="What went wrong, in your words"
          rows={2}
          maxLength={500}
          value={reason}
          error={at('reason') ?? (tried && reason.trim().length < 5 ? 'Say why the value changes.' : undefined)}
          onChange={(event) => setReason(event.target.value)}
        />
        {refused && !at('value') && !at('reason') ? (
          <p role="alert" className="is-needs">
            {refused.detail}
          </p>
        ) : null}
      </form>
    </Dialog>
  );
}

function NewFact({ fact, value, error, onValue }: { fact: Fact; value: string; error: string | undefined; onValue: (value: string) => void }) {
  const common = { label: 'New value', value, error, onChange: (event: { target: { value: string } }) => onValue(event.target.value) };
  if (fact.kind === 'date') return <DateField {...common} />;
  return 'unit' in fact.kind ? <NumberField {...common} unit={fact.kind.unit} /> : <Select {...common} none="Choose" choices={fact.kind} />;
}
