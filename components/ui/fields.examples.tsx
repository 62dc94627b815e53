'use client';

import { useState } from 'react';
import { Checkbox } from './checkbox';
import { DateField } from './date-field';
import { ErrorSummary } from './error-summary';
import { ChoiceInSentence, ValueInSentence } from './in-sentence';
import { NumberField } from './number-field';
import { RadioGroup } from './radio-group';
import { Select } from './select';
import { Stepper } from './stepper';
import { SignaturePad } from './signature-pad';
import { TextArea } from './text-area';
import { TextField } from './text-field';

const sites = [
  { value: 'northmoor', label: 'Northmoor' },
  { value: 'saltmarsh', label: 'Saltmarsh' },
  { value: 'kestrel-bay', label: 'Kestrel Bay' },
];

/** Every field at rest and with an error. */
export function FieldExamples() {
  return (
    <div className="grid gap-7 sm:grid-cols-2 xl:grid-cols-4">
      <NumberField label="Body weight" hint="Without shoes" unit="kg" defaultValue="71.4" />
      <NumberField
        label="Body weight, second reading"
        hint="Without shoes"
        unit="kg"
        defaultValue="741"
        error="741 kg is over the limit of 250. Was it 74.1?"
      />
      <TextField label="Reason for the change" hint="Kept with the old value" placeholder="For example, misread the sheet" />
      <Select label="Site" hint="Where the visit took place" choices={sites} defaultValue="saltmarsh" />
      <DateField label="Date of visit" defaultValue="2026-12-03" />
      <RadioGroup
        label="Heat, redness or fever"
        name="heat"
        defaultValue="no"
        choices={[
          { value: 'no', label: 'No' },
          { value: 'yes', label: 'Yes' },
          { value: 'not-asked', label: 'Not asked' },
        ]}
      />
      <fieldset className="field picks">
        <legend className="field-label">Also send to</legend>
        <Checkbox label="Study lead" defaultChecked />
        <Checkbox label="Data steward" />
      </fieldset>
      <TextArea label="Question for the site" hand defaultValue="The arm check of 28 Nov says hand and forearm. Hand only here?" />
    </div>
  );
}

/** A filter as a sentence. */
export function SentenceExamples() {
  return (
    <p className="t-choices">
      Queries that are{' '}
      <ChoiceInSentence
        label="status"
        defaultValue="both"
        choices={[
          { value: 'both', label: 'open or answered' },
          { value: 'open', label: 'open' },
        ]}
      />{' '}
      at <ChoiceInSentence label="site" choices={[{ value: 'all', label: 'all three sites' }, ...sites]} />, older than{' '}
      <ValueInSentence label="days" defaultValue="14" inputMode="numeric" size={3} /> days, oldest first.
    </p>
  );
}

/** What stands in the way, named once and leading to its field. */
export function ErrorSummaryExamples() {
  const [shown, setShown] = useState(false);
  return (
    <div className="grid max-w-[520px] gap-4">
      {shown ? (
        <ErrorSummary problems={[{ fieldId: 'example-weight', sentence: '741 kg is over the limit of 250. Was it 74.1?' }]} />
      ) : null}
      <NumberField
        id="example-weight"
        label="Weight today"
        unit="kg"
        defaultValue="741"
        error={shown ? '741 kg is over the limit of 250. Was it 74.1?' : undefined}
      />
      <button type="button" className="btn w-fit" onClick={() => setShown(!shown)}>
        <span>{shown ? 'Mend it' : 'Check the form'}</span>
      </button>
    </div>
  );
}

/** The phone's controls, 390 px wide. */
export function PhoneControlExamples() {
  const [kg, setKg] = useState(7);
  const [lifts, setLifts] = useState(10);
  const [soreness, setSoreness] = useState('little');
  return (
    <div className="on-phone grid max-w-[350px] gap-5 text-[18px] leading-[27px]">
      <Stepper label="Load" labelHidden value={kg} onChange={setKg} step={0.5} decimals={1} unit="kg" max={250} outside={kg > 8} />
      <Stepper label="Lifts in a row" size="small" value={lifts} onChange={setLifts} max={60} />
      <RadioGroup
        as="tiles"
        label="How hard was the last set?"
        name="effort"
        defaultValue="some"
        choices={[
          { value: 'many', label: 'Easy, many more in me' },
          { value: 'some', label: 'Two to four left' },
          { value: 'none', label: 'Nothing left' },
        ]}
      />
      <RadioGroup
        as="row"
        label="Sore since last time?"
        name="soreness"
        value={soreness}
        onChange={(event) => setSoreness(event.target.value)}
        choices={[
          { value: 'no', label: 'No' },
          { value: 'little', label: 'A little' },
          { value: 'lot', label: 'A lot' },
        ]}
      />
      <Checkbox tile label="I have read all seven parts and my questions were answered." defaultChecked />
      <SignaturePad stamp="3 Mar 2027, 19:06" onChange={() => undefined} />
    </div>
  );
}
