'use client';

import { useState } from 'react';
import { Button } from './button';
import { Dialog } from './dialog';
import { ReasonDialog } from './reason-dialog';
import { Tabs } from './tabs';
import { useToast } from './toast';

const tabs = [
  { key: 'all', label: 'All', count: 14 },
  { key: 'visits', label: 'Visits', count: 8 },
  { key: 'queries', label: 'Queries', count: 2 },
];

/** Toasts and dialogs, opened by a press. */
export function SaidBackExamples() {
  const { say } = useToast();
  const [open, setOpen] = useState<'close' | 'reason' | 'advice' | null>(null);
  const shut = () => setOpen(null);
  return (
    <div className="flex flex-wrap gap-3">
      <Button onClick={() => say({ kind: 'fine', word: 'Saved.', text: 'Month 9, tape, left trial 2. 10:52.' })}>Save</Button>
      <Button
        onClick={() =>
          say({
            kind: 'act',
            word: 'Closed 3 queries.',
            text: 'Northmoor and Saltmarsh have been told.',
            action: { label: 'See them', run: shut },
          })
        }
      >
        Close 3 queries
      </Button>
      <Button
        onClick={() =>
          say({ kind: 'needs', word: 'Not saved, no connection.', text: 'Kept on this device; we try again every 30 seconds.' })
        }
      >
        Lose the connection
      </Button>
      <Button onClick={() => setOpen('close')}>Ask before closing</Button>
      <Button onClick={() => setOpen('reason')}>Ask for a reason</Button>
      <Button onClick={() => setOpen('advice')}>Show the advice</Button>
      <Dialog
        open={open === 'close'}
        onClose={shut}
        title="Close 3 queries?"
        actions={
          <>
            <Button kind="primary" onClick={shut}>
              Close 3 queries
            </Button>
            <Button onClick={shut}>Go back</Button>
          </>
        }
      >
        The reason “Value agrees with the source” and the time are written to each field’s history. This cannot be undone.
      </Dialog>
      <ReasonDialog
        open={open === 'reason'}
        onClose={shut}
        title="Why does 27.4 become 25.9?"
        confirmLabel="Change and sign"
        keepLabel="Keep 27.4"
        reasons={['Misread the sheet', 'Typed in the wrong cell']}
        sign
        onConfirm={shut}
      />
      <Dialog
        as="sheet"
        open={open === 'advice'}
        onClose={shut}
        title="That is 3 kg more than last week"
        actions={
          <>
            <Button kind="primary" size="phone" wide onClick={shut}>
              Change to 8 kg
            </Button>
            <Button size="phone" wide onClick={shut}>
              I have already lifted 9 kg
            </Button>
          </>
        }
      >
        The study’s rule is at most 2 kg more from one week to the next, and only if the arm is unchanged. This log does not replace your
        clinician’s advice.
      </Dialog>
    </div>
  );
}

/** Tabs that narrow one list. */
export function TabsExamples() {
  const [current, setCurrent] = useState('all');
  return <Tabs label="Kind of work" tabs={tabs} current={current} onChoose={setCurrent} />;
}
