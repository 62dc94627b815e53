'use client';

import { useState, type FormEvent } from 'react';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { TextArea } from '../ui/text-area';

export interface WriteNoteProps {
  path: string;
  /** Name of the words in the request. */
  field: 'answer' | 'question';
  /** What else goes with the words. */
  also?: object;
  label: string;
  verb: string;
  /** The version that was seen; a create has none. */
  version?: number;
  /** In the monitor's hand. */
  hand?: boolean;
  onDone: () => void;
  onDiscard: () => void;
}

/** Words written in the margin. They stay where they are until the server has them. */
export function WriteNote({ path, field, also = {}, label, verb, version, hand, onDone, onDiscard }: WriteNoteProps) {
  const [words, setWords] = useState('');
  const [isEmpty, setIsEmpty] = useState(false);
  const write = useSend<unknown>('POST', path, version === undefined ? {} : { version });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (write.isPending) return;
    if (!words.trim()) setIsEmpty(true);
    else write.mutate({ ...also, [field]: words.trim() }, { onSuccess: onDone });
  };
  const problem = write.error?.problem;
  const error = isEmpty && !words.trim() ? 'Write it first.' : (problem?.fields?.[0]?.sentence ?? problem?.detail);
  return (
    <form className="write-note" onSubmit={submit} noValidate>
      <TextArea
        label={label}
        rows={3}
        maxLength={1000}
        autoFocus
        value={words}
        error={error}
        onChange={(event) => setWords(event.target.value)}
        onKeyDown={(event) => {
          if (event.key === 'Escape' && !words) onDiscard();
        }}
        {...(hand ? { hand } : {})}
      />
      <div className="note-actions">
        <Button type="submit" kind="primary" size="small" atWork={write.isPending ? 'Sending' : false}>
          {verb}
        </Button>
        <Button kind="link" className="ml-auto" onClick={onDiscard}>
          Discard
        </Button>
      </div>
    </form>
  );
}
