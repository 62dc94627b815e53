import type { LiftedExercise, LiftingView } from '@/lib/training/view-lifting';
import { ButtonLink } from '../ui/button';
import { countOf, formatDate, formatNearDate, formatNumber } from '../ui/format';
import { PlainTable } from '../ui/plain-table';

const kg = (value: number): string => formatNumber(value, Number.isInteger(value * 2) ? 1 : 2);

/** What was logged, plainly. */
export function MyLifting({ lifting }: { lifting: LiftingView }) {
  const { sessionCount, exercises, sessions } = lifting;
  return (
    <>
      <h1>My lifting</h1>
      <p className="phone-lede">{sessionCount === 0 ? 'No session is logged yet.' : `${countOf(sessionCount, 'session')} logged so far.`}</p>
      <div className="mt-5">
        <ButtonLink kind="primary" size="phone" wide href="/log">
          Log a session
        </ButtonLink>
      </div>
      {sessions.length > 0 ? (
        <section className="mt-8">
          <h2>Latest sessions</h2>
          <ul className="phone-list mt-2 border-t border-rule">
            {sessions.map(({ id, on, late, armCheck, sets }) => (
              <li key={id}>
                <p className="font-semibold">
                  {formatNearDate(on)} {on.slice(0, 4)}
                  {late ? <span className="font-normal text-ink-2">, entered late</span> : null}
                </p>
                {armCheck === 'the same' ? null : <p className="text-[16px] text-ink-2">Arm: {armCheck}</p>}
                <ul className="text-[16px] leading-6 text-ink-2">
                  {sets.map(({ name, equipment, typed, unit, repetitions, setCount, exercise }) => (
                    <li key={exercise}>
                      {name}: {equipment === 'body weight' ? 'body weight' : equipment === 'band' ? `band level ${typed}` : `${formatNumber(typed, Number.isInteger(typed) ? 0 : 1)} ${unit}`}, {repetitions} lifts, {countOf(setCount, 'set')}
                    </li>
                  ))}
                </ul>
              </li>
            ))}
          </ul>
        </section>
      ) : null}
      {exercises.map((exercise) => (
        <Exercise key={exercise.code} exercise={exercise} />
      ))}
      <p className="mt-6 text-[16px] leading-6 text-ink-2">More is not the aim: staying at a load, or going lighter, is as good an entry. This does not replace your clinician’s advice.</p>
    </>
  );
}

function Exercise({ exercise: { name, weeks } }: { exercise: LiftedExercise }) {
  return (
    <details className="chart-table mt-4 border-t border-rule pt-2">
      <summary className="pad-44">{name}, the heaviest load of each week</summary>
      <PlainTable
        caption={`${name}: heaviest load of each week`}
        tight
        rows={weeks.toReversed()}
        getRowId={({ monday }) => monday}
        columns={[
          { id: 'week', header: 'Week of', cell: ({ monday }) => formatDate(monday) },
          { id: 'load', header: 'Heaviest, kg', numeric: true, cell: ({ heaviestKg }) => kg(heaviestKg) },
        ]}
      />
    </details>
  );
}
