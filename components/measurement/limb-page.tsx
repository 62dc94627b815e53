'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { LimbPageView } from '@/lib/measurement/view-limb-page';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { useSend } from '../api/use-send';
import { Button, ButtonLink } from '../ui/button';
import { Caution } from '../ui/caution';
import { formatDateRange } from '../ui/format';
import { TextField } from '../ui/text-field';
import { ArmDifference } from './arm-difference';
import { ArmDrawing } from './arm-drawing';
import { DrawingHead, ArmChoice } from './entry-parts';
import { EntryGrid } from './entry-grid';
import { columnsOf } from './grid-keys';
import { LimbEntry } from './limb-entry';
import { LimbResult, Verdicts } from './limb-result';
import { typedFrom } from './typed-sitting';

/** The limb page: not begun, being taken, or saved with its result. */
export function LimbPage({ page, mayMeasure }: { page: LimbPageView; mayMeasure: boolean }) {
  const router = useRouter();
  const [view, setView] = useState(page.assessment);
  const formHref = `/participants/${page.code}/visits/${page.visit.id}`;
  if (view === null) return <Begin visit={page.visit} today={page.today} mayMeasure={mayMeasure} onBegun={setView} />;
  if (view.state === 'complete') return <SavedSitting view={view} formHref={formHref} />;
  if (!mayMeasure) return <p className="mt-8">The arms are being measured. The values can be read once both trials are saved.</p>;
  return <LimbEntry view={view} page={page} onComplete={setView} onLeave={() => router.push(formHref)} />;
}

function Begin({ visit, today, mayMeasure, onBegun }: { visit: LimbPageView['visit']; today: string; mayMeasure: boolean; onBegun: (view: OpenAssessmentView) => void }) {
  const [windowReason, setWindowReason] = useState('');
  const begin = useSend<OpenAssessmentView, { windowReason?: string }>('POST', `/api/visits/${visit.id}/assessment`);
  const refused = begin.error?.problem;
  const isOutside = visit.state === 'to come' && (today < visit.opensOn || today > visit.closesOn);
  return (
    <div className="mt-8 grid max-w-[640px] gap-5">
      <p className="t-lede">
        Both arms are measured at every mark, twice: trial 1 left and right, then trial 2 left and right. Where two readings of a mark differ beyond the tolerance a
        third is taken. Earlier values stay hidden until both trials are saved.
      </p>
      <Caution title="Arm hot, red, suddenly swollen, or fever:">stop, and send for urgent care.</Caution>
      {refused && !(isOutside && refused.fields?.some(({ field }) => field === 'windowReason')) ? (
        <p role="alert" className="is-needs">
          {refused.detail}
        </p>
      ) : null}
      {isOutside && mayMeasure ? (
        <TextField
          label={`Why it takes place ${today < visit.opensOn ? 'before' : 'after'} its window`}
          hint={`The window is ${formatDateRange(visit.opensOn, visit.closesOn)}. The visit will count as ${today < visit.opensOn ? 'early' : 'late'}.`}
          maxLength={300}
          value={windowReason}
          error={refused?.fields?.find(({ field }) => field === 'windowReason')?.sentence}
          onChange={(event) => setWindowReason(event.target.value)}
        />
      ) : null}
      {mayMeasure ? (
        <p>
          <Button kind="primary" atWork={begin.isPending ? 'Beginning' : false} onClick={() => begin.mutate(windowReason.trim() ? { windowReason: windowReason.trim() } : {}, { onSuccess: onBegun })}>
            Begin measuring
          </Button>
        </p>
      ) : (
        <p>Nothing has been saved at this visit yet.</p>
      )}
    </div>
  );
}

function SavedSitting({ view, formHref }: { view: CompleteAssessmentView; formHref: string }) {
  const [arm, setArm] = useState<'left' | 'right'>('left');
  const typed = typedFrom(view.trials);
  const third = (side: 'left' | 'right') =>
    view.trials.find((row) => row.side === side && row.trial === 3)?.circumferencesMm.flatMap((mm, level) => (mm === null ? [] : [level])) ?? [];
  const columns = columnsOf(view.map.levelCount, { left: third('left'), right: third('right') });
  const baseline = view.earlier.find(({ isBaseline }) => isBaseline);
  const minus = (a: readonly (number | null)[], b: readonly (number | null)[]) => a.map((mm, level) => (mm === null || b[level] == null ? null : mm - b[level]));
  const baselineMm = baseline && baseline.leftGirthsMm.length === view.map.levelCount ? minus(baseline.leftGirthsMm, baseline.rightGirthsMm) : null;
  return (
    <>
      <div className="limb-work">
        <div>
          <ArmChoice arm={arm} onArm={setArm} />
          <EntryGrid {...{ columns, typed, arm }} map={view.map} doubts={new Map()} firstCovered={false} readOnly onArm={setArm} onType={() => undefined} onLeaveCell={() => undefined} onLeaveColumn={() => undefined} />
        </div>
        <div className="limb-drawing limb-drawing-wide">
          <div>
            <DrawingHead affectedSide={view.affectedSide} />
            <ArmDrawing leftMm={view.leftGirthsMm} rightMm={view.rightGirthsMm} affectedSide={view.affectedSide} />
          </div>
          <div className="limb-difference">
            <p className="drawing-head">
              <b>Left minus right, cm</b>
              {baselineMm ? <span>upright: at baseline</span> : null}
            </p>
            <ArmDifference map={view.map} nowMm={minus(view.leftGirthsMm, view.rightGirthsMm)} baselineMm={baselineMm} />
          </div>
        </div>
        <div className="limb-beside">
          <LimbResult view={view} />
        </div>
      </div>
      <Verdicts view={view} />
      <div className="entry-foot">
        <ButtonLink href={formHref} kind="primary">
          Go to the form and its margin
        </ButtonLink>
        <span className="entry-to-go">Saved. A value is now corrected in the form, with a reason; the old one stays to be read.</span>
      </div>
    </>
  );
}
