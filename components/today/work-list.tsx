import Link from 'next/link';
import type { TodayView } from '@/lib/today/view-today';
import { ButtonLink } from '../ui/button';
import { formatDate, formatNearDate } from '../ui/format';
import { Gauge } from '../ui/gauge';
import { Bracket, Flag, Notch, PastLimit } from '../ui/signs';
import { Empty } from '../ui/waiting';
import { WorkGroup, WorkRow } from '../ui/work-list';
import { WorkKeys } from './work-keys';
import { workWords, type WorkMay } from './work-words';

const weekdays = { Mon: 'Monday', Tue: 'Tuesday', Wed: 'Wednesday', Thu: 'Thursday', Fri: 'Friday', Sat: 'Saturday', Sun: 'Sunday' } as const;
const months = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December'];

/** 'Wednesday 3 March': only where a day stands as a title. */
export function longDay(day: string): string {
  const [weekday = 'Mon'] = formatNearDate(day).split(' ');
  return `${weekdays[weekday as keyof typeof weekdays]} ${Number(day.slice(8))} ${months[Number(day.slice(5, 7)) - 1]}`;
}

function titleOf(key: TodayView['groups'][number]['key'], today: string, lastDay: string): string {
  if (key === 'late') return 'Past due';
  if (key === 'today') return `Today, ${longDay(today)}`;
  return key === 'week' ? 'The next seven days' : `Later, to ${formatDate(lastDay).replace(/ \d{4}$/, '')}`;
}

/** The day's work, every row on the same eight weeks; j and k move through it. */
export function WorkList({ view, may, lastDay }: { view: TodayView; may: WorkMay; lastDay: string }) {
  const groups = view.groups.filter(({ items }) => items.length > 0);
  if (groups.length === 0)
    return (
      <Empty title="Nothing waits" action={<Link href="/participants">See the participants</Link>}>
        No visit, query, report, consent or questionnaire of this kind is due up to {formatDate(lastDay)}.
      </Empty>
    );
  return (
    <WorkKeys>
      {groups.map(({ key, items }, index) => (
        <WorkGroup key={key} title={titleOf(key, view.today, lastDay)} count={items.length} axis={view.axis} first={index === 0}>
          {items.map((item) => {
            const { when, whenDetail, late, kind, codeHref, title, detail, window, state, verb, href, primary } = workWords(item, may, view.now);
            return (
              <WorkRow
                key={`${item.kind}-${item.id}`}
                {...{ when, whenDetail, late, kind, title, detail, window }}
                axis={view.axis}
                code={
                  <Link className="code-link" href={codeHref}>
                    {item.code}
                  </Link>
                }
                state={<Gauge {...state} stacked />}
                action={
                  <ButtonLink kind={primary ? 'primary' : 'link'} size="small" href={href} aria-label={`${verb}: ${item.code}, ${title}`}>
                    {verb}
                  </ButtonLink>
                }
              />
            );
          })}
        </WorkGroup>
      ))}
      <p className="work-key">
        <span>
          <Bracket gone size={20} /> window opens, target, closes; thick is time gone
        </span>
        <span>
          <Notch /> appointment
        </span>
        <span>
          <PastLimit /> past the limit
        </span>
        <span>
          <Flag /> signature needed
        </span>
      </p>
    </WorkKeys>
  );
}
