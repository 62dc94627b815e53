import Link from 'next/link';
import type { WeekItem, WeekView } from '@/lib/training/view-week';
import { SevenDayStaff } from '../chart/seven-day-staff';
import { ButtonLink } from '../ui/button';
import { countOf, formatDate, formatDateRange, formatNearDate, formatTime } from '../ui/format';

const counts = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven'];

/** What the week holds, in a sentence. */
function weekSentence({ isTraining, trainingHeld, sessionsPerWeek, baselineDone, days }: WeekView): string {
  const questionnaires = days.flatMap(({ items }) => items).filter(({ kind }) => kind === 'questionnaire').length;
  const asked = questionnaires > 0 ? ` ${counts[questionnaires] ?? questionnaires} ${questionnaires === 1 ? 'questionnaire' : 'questionnaires'} to answer.` : '';
  if (!baselineDone) return `Training begins once both arms have been measured.${asked}`;
  if (trainingHeld) return `Training is on hold.${asked}`;
  if (!isTraining) return `No sessions are planned.${asked}`;
  return `${counts[sessionsPerWeek] ?? sessionsPerWeek} ${sessionsPerWeek === 1 ? 'session' : 'sessions'}, each with an arm check.${asked}`;
}

/** A participant's week on its own staff. */
export function Week({ week }: { week: WeekView }) {
  const [first, last] = [week.days[0], week.days.at(-1)];
  if (!first || !last) return null;
  return (
    <>
      <h1>Week {week.weekNumber}</h1>
      <p className="phone-lede">
        {formatDateRange(first.on, last.on)}. {weekSentence(week)}
      </p>
      {week.trainingHeld ? <Held week={week} /> : null}
      <div className="mt-5">
        <SevenDayStaff
          label="Your week"
          days={week.days.map(({ on, isToday, items }) => ({
            day: on,
            weekday: formatNearDate(on).slice(0, 3),
            date: Number(on.slice(8)),
            today: isToday,
            ...(items.length > 0 ? { items: <DayItems items={items} siteName={week.site.name} isPast={on < week.today} /> } : {}),
          }))}
        />
      </div>
      <p className="mt-4 text-[16px] leading-6 text-ink-2">
        Trained on another day, or once more? <Link className="pad-44 font-semibold" href="/log">Log a session</Link>
      </p>
    </>
  );
}

/** Training waits: until when, and whom to call. */
function Held({ week: { heldUntilAnswer, site } }: { week: WeekView }) {
  const due = heldUntilAnswer === null ? null : new Date(heldUntilAnswer);
  return (
    <div className="phone-say" role="note">
      <p>
        <b>Please hold your training.</b>{' '}
        {due === null
          ? `Go on once ${site.name} has measured your arms and told you so.`
          : `You told us of a change. ${site.name} is to answer by ${formatNearDate(due, site.timeZone)}, ${formatTime(due, site.timeZone)}.`}{' '}
        Worse? <Link className="font-semibold" href="/report">Tell us again</Link>, or call {site.phone}.
      </p>
    </div>
  );
}

function DayItems({ items, siteName, isPast }: { items: readonly WeekItem[]; siteName: string; isPast: boolean }) {
  return (
    <>
      {items.map((item) => (
        <DayItem key={JSON.stringify(item)} item={item} siteName={siteName} isPast={isPast} />
      ))}
    </>
  );
}

function DayItem({ item, siteName, isPast }: { item: WeekItem; siteName: string; isPast: boolean }) {
  switch (item.kind) {
    case 'visit':
      return (
        <p>
          {item.time ? <b>{item.time} </b> : null}
          {item.done ? `${item.name} visit, done` : item.isWindow ? `${item.name} visit, not booked yet. ${siteName} will call you.` : `${item.name} visit, ${siteName}`}
        </p>
      );
    case 'session':
      return <Session item={item} />;
    case 'questionnaire':
      return (
        <p>
          <Link className="pad-44 font-semibold" href={`/questions/${item.id}`}>
            {item.title}
          </Link>
          , {item.begun ? 'go on' : `about ${countOf(item.minutes, 'minute')}`}, until {formatDate(item.closesOn)}
        </p>
      );
    case 'arm check':
      return isPast ? null : (
        <p>
          <b>Arm check</b>. Changed? <Link className="pad-44 font-semibold" href="/report">Tell us</Link>
        </p>
      );
  }
}

function Session({ item: { number, state, late } }: { item: Extract<WeekItem, { kind: 'session' }> }) {
  if (state === 'logged') return <p>Session {number}, logged{late ? ' late' : ''}</p>;
  if (state === 'planned') return <p className="font-semibold">Session {number}</p>;
  return (
    <>
      <p>
        <b>Session {number}</b>, about 20 minutes
      </p>
      <ButtonLink className="mt-2.5" kind="primary" size="phone" wide href="/log">
        Start session {number}
      </ButtonLink>
    </>
  );
}
