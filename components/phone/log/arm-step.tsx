'use client';
import { useState } from 'react';
import { addDays, addWorkingDays } from '@/instruments/calendar';
import { judgeArmCheck } from '@/instruments/safety/judge-arm-check';
import { armCheckAnswers, armCheckQuestion } from '@/instruments/training/arm-check';
import type { LogView } from '@/lib/training/view-log';
import { Button } from '../../ui/button';
import { DateField } from '../../ui/date-field';
import { formatDate, formatNearDate } from '../../ui/format';
import { RadioGroup } from '../../ui/radio-group';
import { armCodes, type ArmWords } from './log-rules';

const choices = armCheckAnswers.map(({ value, text }) => ({ value: Object.entries(armCodes).find(([, code]) => code === value)?.[0] ?? value, label: text }));

export interface ArmStepProps {
  view: LogView;
  armCheck: ArmWords | null;
  onArmCheck: (answer: ArmWords) => void;
  on: string;
  onDay: (on: string) => void;
  error: string | undefined;
}

/** The arm check before any load, with what happens next. Nothing is chosen beforehand. */
export function ArmStep({ view, armCheck, onArmCheck, on, onDay, error }: ArmStepProps) {
  const [otherDay, setOtherDay] = useState(false);
  return (
    <>
      <h1>{armCheckQuestion(view.affectedSide)}</h1>
      <div className="mt-5">
        <RadioGroup
          id="arm-check"
          name="arm-check"
          as="tiles"
          labelHidden
          label={armCheckQuestion(view.affectedSide)}
          choices={choices}
          value={armCheck}
          onChange={(event) => onArmCheck(event.target.value as ArmWords)}
          error={error}
        />
      </div>
      <div aria-live="polite">{armCheck ? <WhatNext view={view} armCheck={armCheck} /> : null}</div>
      <div className="mt-6 text-[16px] leading-6 text-ink-2">
        {otherDay ? (
          <DateField id="trained-on" label="The day you trained" hint="Never a day to come." value={on} min={view.enrolledOn} max={view.today} onChange={(event) => onDay(event.target.value)} />
        ) : (
          <p>
            This session is of {on === view.today ? 'today' : formatDate(on)}, {formatNearDate(on)}.{' '}
            <Button kind="link" className="pad-44" onClick={() => setOtherDay(true)}>
              Another day
            </Button>
          </p>
        )}
      </div>
    </>
  );
}

function WhatNext({ view, armCheck }: { view: LogView; armCheck: ArmWords }) {
  const verdict = judgeArmCheck(armCodes[armCheck]);
  if (armCheck === 'not sure')
    return (
      <div className="phone-say">
        <p>Stay at your load today, or go lighter. Look at your arm again tomorrow, and tell us if it is fuller, heavier or tighter.</p>
      </div>
    );
  if (!verdict?.siteDeadline) return null;
  const { siteDeadline } = verdict;
  const due = 'workingDays' in siteDeadline ? addWorkingDays(view.today, siteDeadline.workingDays) : 'days' in siteDeadline ? addDays(view.today, siteDeadline.days) : view.today;
  return (
    <div className="phone-say">
      <p>
        <b>{verdict.participantTitle}.</b> {view.site.name} gets this when you send it and calls you by {formatNearDate(due)}, 17:00. Nobody reads it around the clock.
      </p>
    </div>
  );
}
