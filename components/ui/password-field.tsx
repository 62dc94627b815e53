'use client';

import { useState } from 'react';
import { Button } from './button';
import { TextField, type TextFieldProps } from './text-field';

/** A password, hidden until asked to be shown. */
export function PasswordField(props: Omit<TextFieldProps, 'type' | 'unit'>) {
  const [shown, setShown] = useState(false);
  return (
    <TextField
      {...props}
      type={shown ? 'text' : 'password'}
      unit={
        <Button kind="link" onClick={() => setShown(!shown)} aria-pressed={shown}>
          {shown ? 'Hide' : 'Show'}
        </Button>
      }
    />
  );
}
