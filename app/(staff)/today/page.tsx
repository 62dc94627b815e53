import { upperFirst } from '@/instruments/words';
import type { Metadata } from 'next';
import { addressOfToday } from '@/components/today/today-address';
import { TodayMargin } from '@/components/today/today-margin';
import { UrgentReports } from '@/components/today/urgent-reports';
import { longDay, WorkList } from '@/components/today/work-list';
import { kindLabels } from '@/components/today/work-words';
import { Columns, PageHead } from '@/components/ui/page';
import { Tabs } from '@/components/ui/tabs';
import { addDays } from '@/instruments/calendar';
import { may } from '@/lib/auth/policy';
import { viewTodayInput } from '@/lib/today/input';
import { viewToday, type TodayView } from '@/lib/today/view-today';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Today' };

const kinds = Object.keys(kindLabels) as (keyof typeof kindLabels)[];
const words = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine'];
const say = (count: number, one: string, many: string): string => `${words[count] ?? count} ${count === 1 ? one : many}`;

function lede({ siteNames, urgentCount, groups }: TodayView): string {
  const count = (key: string): number => groups.find((group) => group.key === key)?.count ?? 0;
  const parts = [
    ...(urgentCount > 0 ? [`${say(urgentCount, 'report', 'reports')} to look at first`] : []),
    say(count('late'), 'thing past due', 'things past due'),
    `${words[count('today')] ?? count('today')} today`,
    `${words[count('week')] ?? count('week')} in the next seven days`,
  ];
  const sentence = parts.join(', ');
  return `${siteNames.join(' and ')}. ${upperFirst(sentence)}.`;
}

export default async function TodayPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { kind, group, page } = await searchParams;
  const asked = viewTodayInput.safeParse({ kind, group, page });
  const input = asked.success ? asked.data : viewTodayInput.parse({});
  const { role } = await requireActor('today.view');
  const view = await loadPage('today.view', (work) => viewToday(work, input));
  const { counts, axis } = view;
  return (
    <>
      <PageHead
        title={longDay(view.today)}
        lede={lede(view)}
        actions={<Tabs label="Kind of work" current={input.kind} tabs={kinds.map((kind) => ({ key: kind, label: kindLabels[kind], count: counts[kind], href: addressOfToday({ kind }) }))} />}
      />
      <Columns margin={<TodayMargin view={view} />}>
        <UrgentReports view={view} mayReview={may(role, 'symptom.review')} />
        <WorkList
          view={view}
          lastDay={addDays(axis.from, axis.weeks * 7 - 1)}
          may={{ book: may(role, 'visit.book'), review: may(role, 'symptom.review'), countersign: may(role, 'consent.countersign') }}
        />
      </Columns>
    </>
  );
}
