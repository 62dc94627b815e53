import { addDays, daysBetween, mondayOf } from '@/instruments/calendar';
import type { Work } from '@/lib/work/work';
import { todayKinds, type TodayKind, type ViewTodayInput } from './input';
import type { WorkItem } from './kinds';
import type { ReportWork } from './kinds/report';
import { listWork, type WorkTotal } from './list-work';
import { findSites } from './site-day';
import { viewChair, type ChairDay } from './view-chair';
import { viewRecruitment, type ConsentStanding, type RecruitmentView } from './view-recruitment';
import { groupRows, workGroups, type WorkGroupKey } from './work-groups';

/** One group: how many there are of the kind asked for, and the rows of this page; none when another group is asked for. */
export interface TodayGroup {
  readonly key: WorkGroupKey;
  readonly count: number;
  readonly items: readonly WorkItem[];
}

/** The site's day. */
export interface TodayView {
  readonly now: string;
  readonly today: string;
  readonly siteNames: readonly string[];
  /** Eight weeks from a Monday, three of them gone. */
  readonly axis: { readonly from: string; readonly weeks: number; readonly today: string };
  /** Urgent reports stand above the list until they are read, whatever is asked for. */
  readonly urgent: readonly ReportWork[];
  readonly urgentCount: number;
  /** What is shown: a kind, and one group of it (then page by page) or all (then the first rows of each). */
  readonly shown: { readonly kind: TodayKind; readonly group: WorkGroupKey | null; readonly page: number; readonly pageSize: number };
  readonly groups: readonly TodayGroup[];
  readonly counts: Readonly<Record<TodayKind, number>>;
  readonly recruitment: RecruitmentView;
  readonly consent: ConsentStanding;
  readonly chair: readonly ChairDay[];
}

const weeks = 8;
const weeksGone = 3;

function countsOf(totals: readonly WorkTotal[]): TodayView['counts'] {
  const counts = Object.fromEntries(todayKinds.map((kind) => [kind, 0])) as Record<TodayKind, number>;
  for (const { kind, count } of totals) {
    counts[kind] += count;
    counts.all += count;
  }
  return counts;
}

const sum = (totals: readonly WorkTotal[]): number => totals.reduce((total, { count }) => total + count, 0);
const lastPage = (count: number): number => Math.max(0, Math.ceil(count / groupRows) - 1);

/**
 * What the site's team must do, grouped by time in the site's own zone. The number of statements is the same however
 * many participants there are, and so is the most that is answered.
 */
export async function viewToday(work: Work, input: ViewTodayInput): Promise<TodayView> {
  const { kind, group = null, page } = input;
  const { sites, today } = await findSites(work);
  const from = addDays(mondayOf(today), -7 * weeksGone);
  const ahead = daysBetween({ from: today, to: addDays(from, 7 * weeks - 1) });
  const { totals, items } = await listWork(work, input, ahead);
  const groups = workGroups.map((key) => ({
    key,
    count: sum(totals.filter((total) => total.group === key && (kind === 'all' || total.kind === kind))),
    items: items.filter((item) => item.group === key),
  }));
  return {
    now: work.now.toISOString(),
    today,
    siteNames: sites.map(({ name }) => name),
    axis: { from, weeks, today },
    urgent: items.filter((item): item is ReportWork => item.group === 'urgent'),
    urgentCount: sum(totals.filter((total) => total.group === 'urgent')),
    shown: { kind, group, page: Math.min(page, lastPage(groups.find(({ key }) => key === group)?.count ?? 0)), pageSize: groupRows },
    groups,
    counts: countsOf(totals),
    ...(await viewRecruitment(work, { sites, today })),
    chair: await viewChair(work),
  };
}
