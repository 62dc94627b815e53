'use client';

import { useState } from 'react';
import { signatureMade } from '@/lib/consent/input';
import type { ConsentForm } from '@/lib/protocol/document';
import type { ProblemDetails } from '../api/send';
import { Checkbox } from '../ui/checkbox';
import { ErrorSummary, type Problem } from '../ui/error-summary';
import { RadioGroup } from '../ui/radio-group';
import { SignaturePad, type SignatureMade } from '../ui/signature-pad';

export interface Agreement {
  readonly statements: readonly string[];
  readonly permissions: Readonly<Record<string, 'yes' | 'no'>>;
  readonly signature: SignatureMade;
}

const yesNo = [
  { value: 'yes', label: 'Yes' },
  { value: 'no', label: 'No' },
] as const;

const notSigned = 'Sign with a finger, or type your name.';

/** What is wrong with a signature, in the words of the rule that the server asks too. */
const wrongIn = (signature: SignatureMade | null): string | null => (signature ? (signatureMade.safeParse(signature).error?.issues[0]?.message ?? null) : notSigned);

/** What is agreed, each optional permission with its own yes or no and nothing preset, and the signature. */
export function useAgreement(form: ConsentForm) {
  const [ticked, setTicked] = useState<ReadonlySet<string>>(new Set());
  const [permissions, setPermissions] = useState<Readonly<Record<string, 'yes' | 'no'>>>({});
  const [signature, setSignature] = useState<SignatureMade | null>(null);
  const [asked, setAsked] = useState(false);
  const unsigned = wrongIn(signature);
  const open: Problem[] = [
    ...form.statements.filter(({ key }) => !ticked.has(key)).map(({ key, text }) => ({ fieldId: `statement-${key}`, sentence: `Tick this if you agree: ${text}` })),
    ...form.permissions.filter(({ key }) => !permissions[key]).map(({ key, text }) => ({ fieldId: `permission-${key}`, sentence: `Answer yes or no: ${text}` })),
    ...(unsigned ? [{ fieldId: 'signature', sentence: unsigned }] : []),
  ];
  /** The agreement once nothing is open; before that it says what is, and returns null. */
  const finish = (): Agreement | null => {
    setAsked(true);
    return open.length === 0 && signature ? { statements: [...ticked], permissions, signature } : null;
  };
  return { form, ticked, setTicked, permissions, setPermissions, setSignature, problems: asked ? open : [], finish };
}

export interface AgreementFormProps {
  agreement: ReturnType<typeof useAgreement>;
  refusal: ProblemDetails | null;
}

/** The page after the last part. */
export function AgreementForm({ agreement, refusal }: AgreementFormProps) {
  const { form, ticked, setTicked, permissions, setPermissions, setSignature, problems } = agreement;
  const wrong = (id: string) => problems.find(({ fieldId }) => fieldId === id)?.sentence;
  const tick = (key: string, on: boolean) => {
    const next = new Set(ticked);
    if (on) next.add(key);
    else next.delete(key);
    setTicked(next);
  };
  return (
    <div className="grid gap-5">
      <ErrorSummary problems={problems.length > 0 ? problems : refusal ? [{ sentence: refusal.detail }] : []} />
      <ul>
        {form.statements.map(({ key, text }) => (
          <li key={key} className="border-t border-rule py-2.5">
            <Checkbox id={`statement-${key}`} label={text} checked={ticked.has(key)} onChange={(event) => tick(key, event.target.checked)} error={wrong(`statement-${key}`) ? 'Tick this if you agree.' : undefined} />
          </li>
        ))}
      </ul>
      {form.permissions.length > 0 ? (
        <section className="grid gap-4">
          <p className="text-[15.5px] text-ink-2">The next {form.permissions.length === 1 ? 'one is' : 'ones are'} your choice. The study goes on either way.</p>
          {form.permissions.map(({ key, text }) => (
            <RadioGroup
              key={key}
              id={`permission-${key}`}
              name={`permission-${key}`}
              label={text}
              as="row"
              choices={yesNo}
              value={permissions[key] ?? null}
              onChange={(event) => setPermissions({ ...permissions, [key]: event.target.value === 'yes' ? 'yes' : 'no' })}
              error={wrong(`permission-${key}`) ? 'Answer yes or no.' : undefined}
            />
          ))}
        </section>
      ) : null}
      <div id="signature" tabIndex={-1}>
        <SignaturePad onChange={setSignature} error={wrong('signature')} />
      </div>
    </div>
  );
}
