import { addDays, daysBetween, mondayOf } from '@/instruments/calendar';
import { listOpenReports, type ReportRow } from '@/lib/safety/list-open-reports';
import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { z } from 'zod';
import { groupOf } from './group-of';
import type { TodayKind, viewTodayInput } from './input';
import { listConsentsWaiting } from './list-consents-waiting';
import { listQueriesWaiting } from './list-queries-waiting';
import { listQuestionsOverdue } from './list-questions-overdue';
import { listVisitsDue } from './list-visits-due';
import { viewRecruitment, type ConsentStanding, type RecruitmentView } from './view-recruitment';
import { workGroups, type ReportWork, type TodaySite, type WorkGroupKey, type WorkItem } from './work-item';

/** The site's day. */
export interface TodayView {
  readonly now: string;
  readonly today: string;
  readonly siteNames: readonly string[];
  /** Eight weeks from a Monday, three of them gone. */
  readonly axis: { readonly from: string; readonly weeks: number; readonly today: string };
  /** Urgent reports stand above the list until they are read, whatever is asked for. */
  readonly urgent: readonly ReportRow[];
  readonly groups: readonly { readonly key: WorkGroupKey; readonly items: readonly WorkItem[] }[];
  readonly counts: Readonly<Record<TodayKind, number>>;
  readonly recruitment: RecruitmentView;
  readonly consent: ConsentStanding;
  /** Booked visits by day, today and the days to come. */
  readonly chair: readonly { readonly on: string; readonly visits: number; readonly first: string; readonly timeZone: string }[];
}

const weeks = 8;
const weeksGone = 3;

async function sitesOf(work: Work): Promise<TodaySite[]> {
  const rows = await work.sql<Omit<TodaySite, 'today'>>(
    `select id, name, time_zone as "timeZone", recruitment_target as "recruitmentTarget" from site where id = any (?::uuid[]) order by name`,
    [`{${work.actor.reach.join(',')}}`],
  );
  return rows.map((site) => ({ ...site, today: localDate(work.now, site.timeZone) }));
}

function reportWork(report: ReportRow, sites: readonly TodaySite[]): ReportWork[] {
  const site = sites.find(({ name }) => name === report.siteName);
  if (!site || report.dueAt === null) return [];
  const { today, timeZone, name: siteName } = site;
  const dueOn = localDate(moment(report.dueAt), timeZone);
  // A clock that ran out earlier today is late, not due.
  const group = report.isOverdue ? 'late' : groupOf({ dueOn, today });
  return [{ id: report.id, kind: 'report', code: report.participantCode, report, reportedOn: localDate(moment(report.reportedAt), timeZone), dueOn, today, timeZone, siteName, group }];
}

const isUrgent = (report: ReportRow): boolean => report.state === 'new' && (report.urgency === 'emergency now' || report.urgency === 'same-day care');

const order = (a: WorkItem, b: WorkItem): number => a.dueOn.localeCompare(b.dueOn) || timeOf(a).localeCompare(timeOf(b)) || a.code.localeCompare(b.code);
const timeOf = (item: WorkItem): string => (item.kind === 'visit' ? (item.bookedAt ?? '~') : item.kind === 'report' ? (item.report.dueAt ?? '~') : '~');

function chairOf(items: readonly WorkItem[]): TodayView['chair'] {
  const days = new Map<string, { on: string; visits: number; first: string; timeZone: string }>();
  for (const item of items) {
    if (item.kind !== 'visit' || item.bookedOn === null || item.bookedAt === null || item.bookedOn < item.today) continue;
    const day = days.get(item.bookedOn);
    days.set(item.bookedOn, { on: item.bookedOn, visits: (day?.visits ?? 0) + 1, first: day && day.first < item.bookedAt ? day.first : item.bookedAt, timeZone: item.timeZone });
  }
  return [...days.values()].sort((a, b) => a.on.localeCompare(b.on));
}

/**
 * Everything the site's team must do, grouped by time in the site's own zone. The number of statements is the same
 * however many participants there are.
 */
export async function viewToday(work: Work, { kind }: z.output<typeof viewTodayInput>): Promise<TodayView> {
  const sites = await sitesOf(work);
  const [first] = sites;
  const today = first?.today ?? localDate(work.now, 'UTC');
  const from = addDays(mondayOf(today), -7 * weeksGone);
  const ahead = daysBetween({ from: today, to: addDays(from, 7 * weeks - 1) });
  const byId = new Map(sites.map((site) => [site.id, site]));
  const reports = await listOpenReports(work);
  const urgent = reports.filter(isUrgent);
  const all: WorkItem[] = [
    ...(await listVisitsDue(work, byId, ahead)),
    ...(await listQueriesWaiting(work, byId)),
    ...reports.filter((report) => !isUrgent(report)).flatMap((report) => reportWork(report, sites)),
    ...(await listConsentsWaiting(work, byId)),
    ...(await listQuestionsOverdue(work, byId)),
  ];
  const shown = all.filter((item) => kind === 'all' || item.kind === kind).sort(order);
  const count = (of: WorkItem['kind']): number => all.filter((item) => item.kind === of).length;
  return {
    now: work.now.toISOString(),
    today,
    siteNames: sites.map(({ name }) => name),
    axis: { from, weeks, today },
    urgent,
    groups: workGroups.map((key) => ({ key, items: shown.filter(({ group }) => group === key) })),
    counts: {
      all: all.length + urgent.length,
      visit: count('visit'),
      report: count('report') + urgent.length,
      query: count('query'),
      consent: count('consent'),
      questionnaire: count('questionnaire'),
    },
    ...(await viewRecruitment(work, sites)),
    chair: chairOf(all),
  };
}
