'use client';

import { useState, type FormEvent } from 'react';
import { Button } from './button';
import { Dialog } from './dialog';
import { Select, type Choice } from './select';
import { TextArea } from './text-area';
import { TextField } from './text-field';

export interface ReasonGiven {
  reason: string;
  /** Empty unless `sign` was asked for. */
  password: string;
}

export interface ReasonDialogProps {
  open: boolean;
  onClose: () => void;
  /** 'Why does 27.4 become 25.9?' */
  title: string;
  /** What will happen, in a sentence or two. */
  explains?: string;
  /** 'Change and sign'. */
  confirmLabel: string;
  /** 'Keep 27.4'. */
  keepLabel: string;
  /** Ready reasons; the person may still write an own one. */
  reasons?: readonly string[];
  /** Asks for the password as a signature, in the same dialog. */
  sign?: boolean;
  risk?: boolean;
  onConfirm: (given: ReasonGiven) => void;
  /** 'Signing', while the answer is awaited. */
  atWork?: string | false;
  /** A refusal from the server: 'This is not your password.' */
  error?: string | undefined;
}

const own = 'own';

/** Reason, and where asked the signature, in one dialog. It does not close by itself: the caller does once the answer is in. */
export function ReasonDialog(props: ReasonDialogProps) {
  const { open, onClose, title, explains, confirmLabel, keepLabel, risk, atWork } = props;
  return (
    <Dialog
      open={open}
      onClose={onClose}
      title={title}
      actions={
        <>
          <Button type="submit" form="reason-form" kind={risk ? 'risk' : 'primary'} atWork={atWork}>
            {confirmLabel}
          </Button>
          <Button onClick={onClose}>{keepLabel}</Button>
        </>
      }
    >
      {explains ? <p>{explains}</p> : null}
      <ReasonForm {...props} />
    </Dialog>
  );
}

function ReasonForm({ reasons = [], sign, onConfirm, error }: ReasonDialogProps) {
  const [chosen, setChosen] = useState(reasons[0] ?? own);
  const [written, setWritten] = useState('');
  const [password, setPassword] = useState('');
  const [missing, setMissing] = useState<{ reason?: string; password?: string }>({});
  const reason = chosen === own ? written.trim() : chosen;
  const confirm = (event: FormEvent) => {
    event.preventDefault();
    const found = {
      ...(reason ? {} : { reason: 'Write the reason; it is kept with the old value.' }),
      ...(sign && !password ? { password: 'Give your password; it is your signature.' } : {}),
    };
    setMissing(found);
    if (Object.keys(found).length === 0) onConfirm({ reason, password });
  };
  const choices: Choice[] = [...reasons.map((value) => ({ value, label: value })), { value: own, label: 'Another reason' }];
  return (
    <form id="reason-form" noValidate onSubmit={confirm} className="mt-3 grid gap-3.5">
      {reasons.length > 0 ? (
        <Select label="Reason" choices={choices} value={chosen} onChange={(event) => setChosen(event.target.value)} />
      ) : null}
      {chosen === own ? (
        <TextArea
          label={reasons.length > 0 ? 'The reason in your words' : 'Reason'}
          hint="Kept with the old value"
          rows={2}
          maxLength={500}
          value={written}
          error={missing.reason}
          onChange={(event) => setWritten(event.target.value)}
        />
      ) : null}
      {sign ? (
        <TextField
          label="Your password, as your signature"
          type="password"
          autoComplete="current-password"
          value={password}
          error={missing.password ?? error}
          onChange={(event) => setPassword(event.target.value)}
        />
      ) : null}
      {error && !sign ? (
        <p role="alert" className="is-needs">
          {error}
        </p>
      ) : null}
    </form>
  );
}
