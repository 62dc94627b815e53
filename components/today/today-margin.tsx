import Link from 'next/link';
import type { TodayView } from '@/lib/today/view-today';
import { RecruitmentChart } from '../chart/recruitment-chart';
import { countOf, formatCount, formatDate, formatNearDate, formatNumber, formatTime } from '../ui/format';
import { Gauge } from '../ui/gauge';
import { MarginPart } from '../ui/page';

const monthDays = 30.4375;

function paceWords({ target, count, today, to, pacePerDay }: TodayView['recruitment']): string {
  const recent = `${formatNumber(pacePerDay * monthDays, 1)} a month over the last three.`;
  const left = target - count;
  if (left <= 0) return `${recent} The target is reached.`;
  const days = (Date.parse(to) - Date.parse(today)) / 86_400_000;
  return days > 0 ? `${recent} Reaching ${formatCount(target)} by ${formatDate(to)} takes ${formatNumber((left / days) * monthDays, 1)}.` : recent;
}

/** Recruitment, consent and the chair, beside the day's work. */
export function TodayMargin({ view }: { view: TodayView }) {
  const { recruitment, consent, chair } = view;
  const { from, to, today, target, enrolled, pacePerDay, count } = recruitment;
  return (
    <>
      <MarginPart title="Recruitment">
        <p className="t-lede mb-2">
          <span className="font-serif text-[40px] leading-none text-ink">{formatCount(count)}</span> of {formatCount(target)}
        </p>
        <RecruitmentChart {...{ from, to, today, target, enrolled, pacePerDay }} label={`${count} of ${target} recruited.`} />
        <p className="t-small mt-2 text-ink-2">{paceWords(recruitment)} The thin line spreads the target evenly over the study.</p>
        <p className="mt-2">
          <Link className="font-semibold" href="/screening">
            Screening log
          </Link>
        </p>
      </MarginPart>
      <MarginPart title={`Consent to form ${consent.number}`}>
        <Gauge state={consent.current === consent.of ? 'done' : 'part'} level={consent.of > 0 ? consent.current / consent.of : 0} size={84} word={`${formatCount(consent.current)} of ${formatCount(consent.of)} in the study`} />
      </MarginPart>
      <MarginPart title="Chair time">
        {chair.length === 0 ? <p className="t-small text-ink-2">No visit is booked.</p> : null}
        <ul>
          {chair.map(({ on, visits, first, timeZone }) => (
            <li key={on} className="flex justify-between gap-3 border-b border-rule py-1.5">
              <span>{formatNearDate(on)}</span>
              <span>{countOf(visits, 'visit')}</span>
              <span className="t-num">from {formatTime(new Date(first), timeZone)}</span>
            </li>
          ))}
        </ul>
      </MarginPart>
      <MarginPart>
        <p className="t-small text-ink-2">
          Keys: <kbd>j</kbd> <kbd>k</kbd> move, <kbd>Enter</kbd> opens, <kbd>/</kbd> finds.
        </p>
      </MarginPart>
    </>
  );
}
