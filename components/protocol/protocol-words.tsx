import type { ReactNode } from 'react';
import type { ProtocolView } from '@/lib/protocol/view-protocol';
import { countOf, formatGirthCm, formatLoadKg, formatNumber, formatPercent } from '../ui/format';
import { PlainTable } from '../ui/plain-table';

function Part({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="mt-9">
      <h2 className="mb-3">{title}</h2>
      {children}
    </section>
  );
}

const prose = 't-prose grid max-w-[820px] gap-3';

function Schedule({ view }: { view: ProtocolView }) {
  const { document, questionnaireNames } = view;
  return (
    <Part title="Visits">
      <p className="mb-3 text-ink-2">Counted from {document.anchor === 'enrolment' ? 'the day of enrolment' : document.anchor === 'surgery' ? 'the day of surgery' : 'the first session'}. A visit outside its window is kept and marked.</p>
      <PlainTable
        caption="Visit schedule"
        rows={document.visits}
        getRowId={({ key }) => key}
        columns={[
          { id: 'name', header: 'Visit', cell: ({ name }) => <b>{name}</b> },
          { id: 'day', header: 'Target day', numeric: true, cell: ({ offsetDays }) => formatNumber(offsetDays) },
          { id: 'early', header: 'Days before', numeric: true, cell: ({ earlyDays }) => formatNumber(earlyDays) },
          { id: 'late', header: 'Days after', numeric: true, cell: ({ lateDays }) => formatNumber(lateDays) },
          { id: 'forms', header: 'With it', cell: ({ questionnaires }) => ['limb assessment', ...questionnaires.map((key) => questionnaireNames[key] ?? key)].join(', ') },
        ]}
      />
    </Part>
  );
}

function Measurement({ view }: { view: ProtocolView }) {
  const { measurement, swelling } = view.document;
  return (
    <Part title="Limb measurement and swelling">
      <div className={prose}>
        <p>
          Both arms are measured by tape at {measurement.levelCount} levels, every {formatGirthCm(measurement.stepMm)} from {measurement.startOffsetMm === 0 ? 'the wrist' : `${formatGirthCm(measurement.startOffsetMm)} above the wrist`} upward, twice; a third time
          where the two differ by more than {formatGirthCm(measurement.toleranceMm)}. Position: {measurement.position}.
        </p>
        <p>
          Volumes are summed from {measurement.method === 'frustum' ? 'truncated cones' : 'disks'}. The standard error of one arm’s volume is taken as {formatPercent(measurement.semPct / 100, 2)} until the registry has its own.
        </p>
        <p className="text-note">
          Swelling is {view.primary}. Also computed: {view.alternatives.join('; ')}. Volumes of the first {swelling.earlyExclusionDays} days are kept apart. Impedance ratio against the {swelling.impedanceCutoffs} cut-offs.
        </p>
      </div>
    </Part>
  );
}

function Training({ view }: { view: ProtocolView }) {
  const { training, sessionsPerWeek, lateAfterHours } = view.document;
  return (
    <Part title="Training rules">
      <div className={prose}>
        <p>
          {countOf(sessionsPerWeek, 'session')} a week: {view.exercises.join(', ').toLowerCase()}. The first load lies between {formatLoadKg(training.startFromKg, true)} and {formatLoadKg(training.startKg, true)}; from one week to the next it rises by at most{' '}
          {formatLoadKg(training.weeklyStepKg, true)}, and only while the arm is unchanged. {formatLoadKg(training.jumpKg, true)} or more at once is a jump, and the site is told.
        </p>
        <p>
          After {training.breakDays} days without training the load starts again at {formatPercent(training.resumeFromFraction, 0)} to {formatPercent(training.resumeToFraction, 0)} of the last one. A session may be entered for {lateAfterHours} hours without a mark.
        </p>
        <p className="text-ink-2">A rule advises and marks; it never blocks what was truly lifted, and it does not replace a clinician’s advice.</p>
      </div>
    </Part>
  );
}

/** The protocol in force, read only, in sentences and tables. */
export function ProtocolWords({ view }: { view: ProtocolView }) {
  const { document, consent } = view;
  return (
    <>
      <Part title="Who takes part">
        <p className="mb-3">Cohorts: {document.cohorts.map(({ name }) => name.toLowerCase()).join(', ')}.</p>
        <PlainTable
          caption="Eligibility"
          rows={document.eligibility}
          getRowId={({ key }) => key}
          columns={[
            { id: 'text', header: 'Criterion', cell: ({ text }) => text },
            { id: 'lets', header: 'Lets in', width: '120px', cell: ({ lets }) => <b>{lets}</b> },
          ]}
        />
      </Part>
      <Schedule view={view} />
      <Measurement view={view} />
      <Training view={view} />
      <Part title="Data queries">
        <p className={prose}>A data query is due after {countOf(document.queryDueDays, 'day')}.</p>
      </Part>
      <Part title={`Consent form ${consent.number}`}>
        <div className={prose}>
          <p>
            {consent.title}: {consent.parts.join('; ')}.
          </p>
          <p>Choices that leave the study open either way:</p>
          <ul className="list-disc pl-6">
            {consent.permissions.map((text) => (
              <li key={text}>{text}</li>
            ))}
          </ul>
        </div>
      </Part>
    </>
  );
}
