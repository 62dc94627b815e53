'use client';

import { useState } from 'react';
import { Button, ButtonLink } from './button';

/** Each kind and size, and a button that can be put to work. */
export function ButtonExamples() {
  const [atWork, setAtWork] = useState(false);
  return (
    <div className="flex flex-wrap items-start gap-x-8 gap-y-5">
      <Button kind="primary" atWork={atWork && 'Saving'} onClick={() => setAtWork(true)}>
        Save and go on
      </Button>
      <Button kind="primary" atWork="Saving">
        Save and go on
      </Button>
      <Button onClick={() => setAtWork(false)}>Leave unfinished</Button>
      <Button kind="risk">Withdraw consent</Button>
      <Button size="small">Ask again</Button>
      <Button kind="link">Give the reason</Button>
      <ButtonLink href="#buttons">Record an unscheduled visit</ButtonLink>
      <Button kind="primary" size="phone">
        Start session 1
      </Button>
    </div>
  );
}
