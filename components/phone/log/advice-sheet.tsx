'use client';
import { adviceFor, TRAINING_CAUTION } from '@/instruments/training/advice';
import type { TrainingFlag } from '@/instruments/training/judge-sessions';
import type { LogView } from '@/lib/training/view-log';
import { LoadScale } from '../../chart/load-scale';
import { Button } from '../../ui/button';
import { Dialog } from '../../ui/dialog';

export interface AdviceSheetProps {
  view: LogView;
  flag: TrainingFlag | null;
  onChangeTo: (loadKg: number) => void;
  onKeep: () => void;
  onClose: () => void;
}

/** Advice beyond the rule: states the fact, offers the safe load first, and never blocks the truth. */
export function AdviceSheet({ view, flag, onChangeTo, onKeep, onClose }: AdviceSheetProps) {
  const facts = flag?.facts ?? null;
  const advice = flag ? adviceFor(flag, view.settings) : null;
  if (!flag || !facts || !advice) return null;
  const { safeLoadKg, changeLabel, keepLabel, contactSite } = advice;
  return (
    <Dialog
      open
      as="sheet"
      onClose={onClose}
      title={advice.title}
      actions={
        <>
          {changeLabel !== null && safeLoadKg !== null ? (
            <Button kind="primary" size="phone" wide onClick={() => onChangeTo(safeLoadKg)}>
              {changeLabel}
            </Button>
          ) : null}
          <Button size="phone" wide onClick={onKeep}>
            {keepLabel}
          </Button>
          <p className="text-[15.5px] leading-[22px] text-ink-2">
            {advice.note} {TRAINING_CAUTION}
          </p>
        </>
      }
    >
      {facts.isBand ? null : (
        <LoadScale yoursKg={facts.load} lastWeekKg={facts.lastWeekMax ?? facts.previous?.load ?? null} upToKg={safeLoadKg ?? facts.load} outsideKg={(facts.previous?.load ?? 0) + view.settings.jumpKg} />
      )}
      <p>{advice.text}</p>
      {contactSite ? (
        <p className="mt-3">
          <b>
            Call {view.site.name} on <a href={`tel:${view.site.phone.replace(/[^\d+]/g, '')}`}>{view.site.phone}</a> before your next session.
          </b>{' '}
          The site sees what you send in its list.
        </p>
      ) : null}
    </Dialog>
  );
}
