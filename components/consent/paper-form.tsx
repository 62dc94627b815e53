'use client';

import { useRouter } from 'next/navigation';
import { useId, useState } from 'react';
import { formBytesMost } from '@/lib/consent/input';
import type { ConsentForm } from '@/lib/protocol/document';
import type { ProblemDetails } from '../api/send';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { Checkbox } from '../ui/checkbox';
import { DateField } from '../ui/date-field';
import { ErrorSummary, type Problem } from '../ui/error-summary';
import { Field } from '../ui/field';
import { RadioGroup } from '../ui/radio-group';

export interface PaperFormProps {
  consentId: string;
  version: number;
  form: ConsentForm;
  hasForm: boolean;
  /** Today where the site is. */
  today: string;
}

/** Two steps: the signed form as a file, then what stands on it. */
export function PaperForm(props: PaperFormProps) {
  return (
    <div className="mt-4 grid max-w-xl gap-6">
      <AddForm consentId={props.consentId} hasForm={props.hasForm} />
      {props.hasForm ? <RecordForm key={props.version} {...props} /> : null}
    </div>
  );
}

const noConnection = 'Not sent, no connection. Send the file again when the line is back.';

function AddForm({ consentId, hasForm }: { consentId: string; hasForm: boolean }) {
  const router = useRouter();
  const fieldId = useId();
  const [file, setFile] = useState<File | null>(null);
  const [error, setError] = useState<string | undefined>();
  const [sending, setSending] = useState(false);
  const add = async () => {
    if (!file) {
      setError('Choose the file of the signed form.');
      return;
    }
    if (file.size > formBytesMost) {
      setError('The file is larger than 10 MB. Scan the form in grey, or photograph one page at a time.');
      return;
    }
    setSending(true);
    setError(undefined);
    try {
      const answer = await fetch(`/api/consents/${consentId}/paper`, { method: 'POST', body: file, credentials: 'same-origin' });
      if (answer.ok) router.refresh();
      else setError(((await answer.json().catch(() => null)) as ProblemDetails | null)?.detail ?? noConnection);
    } catch {
      setError(noConnection);
    } finally {
      setSending(false);
    }
  };
  return (
    <div className="grid gap-3">
      <Field id={fieldId} label={hasForm ? 'The signed form is here. To replace it, choose another' : 'The signed form'} hint="PDF, JPEG or PNG, at most 10 MB, all pages in one file" error={error}>
        {(joined) => (
          <input
            {...joined}
            type="file"
            accept="application/pdf,image/jpeg,image/png"
            className="rounded-[3px] border border-edge bg-raised p-2 file:mr-4 file:min-h-9 file:cursor-pointer file:rounded-[3px] file:border file:border-solid file:border-ink file:bg-ground file:px-3.5 file:font-semibold"
            onChange={(event) => {
              setFile(event.target.files?.[0] ?? null);
              setError(undefined);
            }}
          />
        )}
      </Field>
      <div>
        <Button kind={hasForm ? 'secondary' : 'primary'} atWork={sending && 'Sending'} onClick={() => void add()}>
          {hasForm ? 'Replace the signed form' : 'Add the signed form'}
        </Button>
      </div>
    </div>
  );
}

interface Paper {
  signedOn: string;
  statements: readonly string[];
  permissions: Readonly<Record<string, string>>;
}

function RecordForm({ consentId, version, form, today }: PaperFormProps) {
  const router = useRouter();
  const [paper, setPaper] = useState<Paper>({ signedOn: '', statements: [], permissions: {} });
  const [asked, setAsked] = useState(false);
  const saving = useSend<unknown, Paper>('POST', `/api/consents/${consentId}/paper-signature`, { version });
  const open: Problem[] = [
    ...(paper.signedOn ? [] : [{ fieldId: 'signedOn', sentence: 'Give the day that stands beside the signature.' }]),
    ...form.statements.filter(({ key }) => !paper.statements.includes(key)).map(({ key, text }) => ({ fieldId: `paper-${key}`, sentence: `Not marked as agreed on the form: ${text}` })),
    ...form.permissions.filter(({ key }) => !paper.permissions[key]).map(({ key, text }) => ({ fieldId: `paper-${key}`, sentence: `Copy the answer from the form: ${text}` })),
  ];
  const wrong = (id: string) => (asked ? open.find(({ fieldId }) => fieldId === id)?.sentence : undefined);
  const refusal = saving.error?.problem;
  const record = () => {
    setAsked(true);
    if (open.length === 0) saving.mutate(paper, { onSuccess: () => router.refresh() });
  };
  return (
    <section className="grid gap-4">
      <h3>What stands on the form</h3>
      <ErrorSummary problems={asked && open.length > 0 ? open : refusal ? [{ sentence: refusal.detail }] : []} />
      <DateField id="signedOn" label="Signed by the participant on" max={today} value={paper.signedOn} error={wrong('signedOn')} onChange={(event) => setPaper({ ...paper, signedOn: event.target.value })} />
      {form.statements.map(({ key, text }) => (
        <Checkbox
          key={key}
          id={`paper-${key}`}
          label={text}
          checked={paper.statements.includes(key)}
          error={wrong(`paper-${key}`)}
          onChange={(event) => setPaper({ ...paper, statements: event.target.checked ? [...paper.statements, key] : paper.statements.filter((one) => one !== key) })}
        />
      ))}
      {form.permissions.map(({ key, text }) => (
        <RadioGroup
          key={key}
          id={`paper-${key}`}
          name={`paper-${key}`}
          label={text}
          choices={[
            { value: 'yes', label: 'Yes' },
            { value: 'no', label: 'No' },
          ]}
          value={paper.permissions[key] ?? null}
          error={wrong(`paper-${key}`)}
          onChange={(event) => setPaper({ ...paper, permissions: { ...paper.permissions, [key]: event.target.value } })}
        />
      ))}
      <div>
        <Button kind="primary" atWork={saving.isPending && 'Saving'} onClick={record}>
          Record the signature
        </Button>
      </div>
    </section>
  );
}
