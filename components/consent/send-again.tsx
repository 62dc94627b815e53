'use client';

import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { useToast } from '../ui/toast';

export interface SendAgainProps {
  /** Where the letter is asked for. */
  path: string;
  body?: object;
  /** 'Send the link again'. */
  verb: string;
  /** 'The link before it no longer works.' */
  text: string;
}

/** Sends a letter with a link again; the link before it stops working. */
export function SendAgain({ path, body = {}, verb, text }: SendAgainProps) {
  const { say } = useToast();
  const sending = useSend('POST', path);
  const press = () =>
    sending.mutate(body, {
      onSuccess: () => say({ kind: 'act', word: 'On its way.', text }),
      onError: ({ problem }) => say({ kind: 'needs', word: 'Not sent.', text: problem.detail }),
    });
  return (
    <Button atWork={sending.isPending && 'Sending'} onClick={press}>
      {verb}
    </Button>
  );
}
