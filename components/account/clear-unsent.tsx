'use client';
import { useEffect } from 'react';
import { sweepUnsent } from '../phone/unsent';
import { deviceShelf } from '../phone/unsent-shelf';

/** Somebody is signed in here now: what another person left unsent on this device goes. `owner` is null for anybody who is no participant. */
export function ClearUnsent({ owner }: { owner: string | null }) {
  useEffect(() => {
    // A device without a shelf has nothing to clear.
    sweepUnsent(deviceShelf, owner, new Date()).catch(() => []);
  }, [owner]);
  return null;
}
