import Link from 'next/link';
import { Fragment } from 'react';
import type { TodayGroup, TodayView } from '@/lib/today/view-today';
import { ButtonLink } from '../ui/button';
import { formatCount, formatDate, formatNearDate } from '../ui/format';
import { Gauge } from '../ui/gauge';
import { Bracket, Flag, Notch, PastLimit } from '../ui/signs';
import { Empty } from '../ui/waiting';
import { WorkGroup, WorkRow } from '../ui/work-list';
import { WorkKeys } from './work-keys';
import { addressOfToday } from './today-address';
import { WorkPager } from './work-pager';
import { workWords, type WorkMay } from './work-words';

const weekdays = { Mon: 'Monday', Tue: 'Tuesday', Wed: 'Wednesday', Thu: 'Thursday', Fri: 'Friday', Sat: 'Saturday', Sun: 'Sunday' } as const;
const months = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December'];

/** 'Wednesday 3 March': only where a day stands as a title. */
export function longDay(day: string): string {
  const [weekday = 'Mon'] = formatNearDate(day).split(' ');
  return `${weekdays[weekday as keyof typeof weekdays]} ${Number(day.slice(8))} ${months[Number(day.slice(5, 7)) - 1]}`;
}

function titleOf(key: TodayGroup['key'], today: string, lastDay: string): string {
  if (key === 'late') return 'Past due';
  if (key === 'today') return `Today, ${longDay(today)}`;
  return key === 'week' ? 'The next seven days' : `Later, to ${formatDate(lastDay).replace(/ \d{4}$/, '')}`;
}

const seeAll = { late: 'See all that are past due', today: 'See all for today', week: 'See all of the next seven days', later: 'See all that come later' } as const;

function Row({ item, view, may }: { item: TodayGroup['items'][number]; view: TodayView; may: WorkMay }) {
  const { when, whenDetail, late, kind, codeHref, title, detail, window, state, verb, href, primary } = workWords(item, may, view.now);
  return (
    <WorkRow
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
}

/** Under a group: its other pages when it is shown alone, else the way to all of it where more wait. */
function More({ group: { key, count, items }, shown: { kind, group, page, pageSize } }: { group: TodayGroup; shown: TodayView['shown'] }) {
  if (group !== null) return <WorkPager {...{ kind, group, pageSize }} pageIndex={page} rowCount={count} />;
  if (count <= items.length) return null;
  return (
    <p className="t-small py-3 text-ink-2">
      First {formatCount(items.length)} of {formatCount(count)}. <Link href={addressOfToday({ kind, group: key })}>{seeAll[key]}</Link>
    </p>
  );
}

/** The day's work, every row on the same eight weeks; j and k move through it. */
export function WorkList({ view, may, lastDay }: { view: TodayView; may: WorkMay; lastDay: string }) {
  const { shown } = view;
  const groups = view.groups.filter(({ items }) => items.length > 0);
  const back = shown.group === null ? null : <Link href={addressOfToday({ kind: shown.kind })}>Back to the whole day</Link>;
  if (groups.length === 0)
    return (
      <Empty title="Nothing waits" action={back ?? <Link href="/participants">See the participants</Link>}>
        {back ? 'Nothing of this kind is left in this group.' : `No visit, query, report, consent or questionnaire of this kind is due up to ${formatDate(lastDay)}.`}
      </Empty>
    );
  return (
    <WorkKeys>
      {back ? <p className="t-small pt-3">{back}</p> : null}
      {groups.map((group, index) => (
        <Fragment key={group.key}>
          <WorkGroup title={titleOf(group.key, view.today, lastDay)} count={group.count} axis={view.axis} first={index === 0}>
            {group.items.map((item) => (
              <Row key={`${item.kind}-${item.id}`} {...{ item, view, may }} />
            ))}
          </WorkGroup>
          <More {...{ group, shown }} />
        </Fragment>
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
