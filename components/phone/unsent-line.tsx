'use client';
import Link from 'next/link';
import { useEffect, useState } from 'react';
import { Button } from '../ui/button';
import { sweepUnsent, type UnsentKind } from './unsent';
import { deviceShelf } from './unsent-shelf';

const words: Readonly<Record<UnsentKind, { text: string; href: string }>> = {
  session: { text: 'A training session', href: '/log' },
  report: { text: 'What you told of a change', href: '/report' },
};

/** On the pages between tasks: what waits on this phone, and the way to it. */
export function UnsentLine({ owner }: { owner: string }) {
  const [kinds, setKinds] = useState<readonly UnsentKind[]>([]);
  useEffect(() => {
    let isGone = false;
    const show = (entries: readonly { kind: UnsentKind }[]): void => {
      if (!isGone) setKinds(entries.map(({ kind }) => kind));
    };
    // A device without a shelf has nothing to show.
    sweepUnsent(deviceShelf, owner, new Date()).then(show, () => show([]));
    return () => {
      isGone = true;
    };
  }, [owner]);
  if (kinds.length === 0) return null;
  return (
    <div className="phone-say !mt-0 mb-5" role="note">
      {kinds.map((kind) => (
        <p key={kind}>
          <b>Not sent yet: kept on this phone.</b> {words[kind].text}.{' '}
          <Link className="pad-44 font-semibold" href={words[kind].href}>
            Go on and send it
          </Link>
        </p>
      ))}
    </div>
  );
}

/** In a task that was taken up again where it stood. */
export function TakenUp({ onForget }: { onForget: () => void }) {
  return (
    <div className="phone-say !mt-0 mb-5" role="status">
      <p>
        <b>Not sent yet: kept on this phone.</b> You go on where you stopped.{' '}
        <Button kind="link" className="pad-44" onClick={onForget}>
          Remove it and begin anew
        </Button>
      </p>
    </div>
  );
}
