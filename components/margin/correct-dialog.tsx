'use client';

import { readDecimal } from '@/instruments/measurement/parse';
import { lowerFirst } from '@/instruments/words';
import { useState, type FormEvent } from 'react';
import { otherPositions } from '@/lib/measurement/input';
import { askedDoubts, keptOf } from '../api/asked-doubts';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { DateField } from '../ui/date-field';
import { Dialog } from '../ui/dialog';
import { NumberField } from '../ui/number-field';
import { Select } from '../ui/select';
import { TextArea } from '../ui/text-area';
import { printValue, unitOfKind, type ReviewItem, type ValueKind } from './review-items';

export interface CorrectDialogProps {
  item: ReviewItem;
  /** The query that the correction answers in the same breath. */
  query: { readonly id: string; readonly number: string; readonly version: number } | null;
  onClose: () => void;
  onDone: () => void;
}

/** Factor from the typed unit to the stored one. */
const toStored: Partial<Record<ValueKind, number>> = { weight: 1000, girth: 10, ratio: 1, hours: 1, minutes: 1 };

function typedFrom({ kind, value }: ReviewItem): string {
  if (value === null) return '';
  if (kind === 'worn') return value === true ? 'yes' : 'no';
  const factor = toStored[kind];
  return factor ? String(Number(value) / factor) : String(value);
}

/** The typed value as the record takes it, or the sentence that says why not. */
function read(kind: ValueKind, typed: string): { value: ReviewItem['value'] } | { sentence: string } {
  if (typed.trim() === '') return kind === 'date' || kind === 'position' || kind === 'worn' || kind === 'girth' ? { sentence: 'Give the value.' } : { value: null };
  if (kind === 'worn') return { value: typed === 'yes' };
  const factor = toStored[kind];
  if (!factor) return { value: typed.trim() };
  // As in the form of the sitting: a comma is a decimal, so that a ratio of 1,045 is no riddle.
  const number = readDecimal(typed);
  if (number === null) return { sentence: `${typed.trim()} is not a number. Type digits and one decimal point or comma.` };
  const stored = number * factor;
  return { value: kind === 'ratio' ? Math.round(stored * 1000) / 1000 : Math.round(stored) };
}

/** The other readings of a level, in whole millimetres; an empty field leaves the reading as it is. */
function readAlso(typed: Readonly<Record<'other' | 'third', string>>): { value: Partial<Record<'other' | 'third', number>>; missing: Partial<Record<'other' | 'third', string>> } {
  const value: Partial<Record<'other' | 'third', number>> = {};
  const missing: Partial<Record<'other' | 'third', string>> = {};
  for (const name of ['other', 'third'] as const) {
    if (typed[name].trim() === '') continue;
    const found = read('girth', typed[name]);
    if ('sentence' in found) missing[name] = found.sentence;
    else value[name] = Number(found.value);
  }
  return { value, missing };
}

/** A saved value and the reason for its change, in one dialog: the old value stays, struck. */
export function CorrectDialog({ item, query, onClose, onDone }: CorrectDialogProps) {
  const [typed, setTyped] = useState(() => typedFrom(item));
  const [reason, setReason] = useState('');
  const [also, setAlso] = useState({ other: '', third: '' });
  const [missing, setMissing] = useState<{ value?: string; reason?: string; other?: string; third?: string }>({});
  const [keeping, setKeeping] = useState<Readonly<Record<string, string>>>({});
  const correct = useSend<{ corrected: true }>('POST', '/api/corrections', { version: item.version });
  const refused = correct.error?.problem;
  const at = (field: string) => refused?.fields?.find((one) => one.field === field)?.sentence;
  const doubts = askedDoubts(refused);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (correct.isPending) return;
    const found = read(item.kind, typed);
    const why = reason.trim().length < 5 ? 'Say why the value changes; it is kept with the old one.' : undefined;
    const others = readAlso(also);
    setMissing({ ...others.missing, ...('sentence' in found ? { value: found.sentence } : {}), ...(why ? { reason: why } : {}) });
    if ('sentence' in found || why || Object.keys(others.missing).length > 0) return;
    correct.mutate({ target: item.target, value: found.value, reason: reason.trim(), ...(Object.keys(others.value).length > 0 ? { also: others.value } : {}), kept: keptOf(keeping), ...(query ? { query: { id: query.id, version: query.version } } : {}) }, { onSuccess: onDone });
  };
  return (
    <Dialog
      open
      onClose={onClose}
      title={`Correct ${lowerFirst(item.label)}?`}
      actions={
        <>
          <Button type="submit" form="correct-form" kind="primary" atWork={correct.isPending ? 'Saving' : false}>
            {query ? `Correct and answer ${query.number}` : 'Correct the value'}
          </Button>
          <Button onClick={onClose}>Keep {printValue(item.kind, item.value)}</Button>
        </>
      }
    >
      <p>The old value stays in the form, struck, with your reason. Results are computed anew, and a mark on the value falls.</p>
      <form id="correct-form" noValidate onSubmit={submit} className="mt-3 grid gap-3.5">
        <NewValue item={item} typed={typed} onType={(text) => { setTyped(text); setKeeping({}); }} error={missing.value ?? at('value')} />
        {at('also') || also.other || also.third ? (
          <fieldset className="grid gap-3.5">
            <legend className="is-needs mb-2">{at('also') ?? 'The other readings of this level'}</legend>
            <NumberField label="The other trial" optional unit="cm" value={also.other} error={missing.other} onChange={(event) => setAlso({ ...also, other: event.target.value })} />
            <NumberField label="Third reading" optional unit="cm" value={also.third} error={missing.third} onChange={(event) => setAlso({ ...also, third: event.target.value })} />
          </fieldset>
        ) : null}
        <TextArea label="Reason" hint="What went wrong, in your words" rows={2} maxLength={500} value={reason} error={missing.reason ?? at('reason')} onChange={(event) => setReason(event.target.value)} />
        {doubts.map(({ field, sentence }) => (
          <TextArea
            key={field}
            label="Why it is kept"
            hint={sentence}
            rows={2}
            maxLength={300}
            value={keeping[field] ?? ''}
            error={(keeping[field] ?? '').trim().length < 3 ? 'Look at the value again, or say why it is kept.' : undefined}
            onChange={(event) => setKeeping((before) => ({ ...before, [field]: event.target.value }))}
          />
        ))}
        {refused && !at('value') && !at('reason') && !at('also') && doubts.length === 0 ? (
          <p role="alert" className="is-needs">
            {refused.detail}
          </p>
        ) : null}
      </form>
    </Dialog>
  );
}

function NewValue({ item, typed, onType, error }: { item: ReviewItem; typed: string; onType: (typed: string) => void; error: string | undefined }) {
  const common = { label: 'New value', value: typed, error, autoFocus: true, onChange: (event: { target: { value: string } }) => onType(event.target.value) };
  if (item.kind === 'date') return <DateField {...common} />;
  if (item.kind === 'words') return <TextArea {...common} rows={3} maxLength={500} />;
  if (item.kind === 'worn')
    return (
      <Select
        {...common}
        choices={[
          { value: 'no', label: 'Not worn' },
          { value: 'yes', label: 'Worn' },
        ]}
      />
    );
  if (item.kind === 'position') {
    const choices = [...new Set([...(typeof item.value === 'string' ? [item.value] : []), ...otherPositions])].map((value) => ({ value, label: value }));
    return <Select {...common} choices={choices} />;
  }
  return <NumberField {...common} unit={unitOfKind(item.kind)} />;
}
