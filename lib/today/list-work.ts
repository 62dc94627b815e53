import type { Work } from '@/lib/work/work';
import type { ViewTodayInput } from './input';
import { workKinds, type WorkItem } from './kinds';
import { siteDay } from './site-day';
import { groupRows, urgentRows, workGroups } from './work-groups';
import type { WorkCommon, WorkKind } from './work-kind';

/** How much there is of one kind in one group. */
export interface WorkTotal {
  readonly kind: WorkItem['kind'];
  readonly group: WorkCommon['group'];
  readonly count: number;
}

export interface WorkList {
  /** Every kind in every group, whatever is shown. */
  readonly totals: readonly WorkTotal[];
  /** The rows to show, in their order. */
  readonly items: readonly WorkItem[];
}

type Key = WorkCommon & Pick<WorkItem, 'kind'>;

/** Any kind of the registry, its row's type known to itself only. */
const kinds: readonly WorkKind<WorkItem, { readonly id: string }>[] = workKinds;

const allWork = kinds.map(({ kind, keys }, turn) => `select '${kind}' as kind, ${turn} as turn, work.* from (${keys}) work`).join('\n union all ');

// Whoever has an hour comes before who only has a day; urgent reports are ordered by their clock alone.
const order = `case when "group" <> 'urgent' then due_on end, at nulls last, code collate "C", turn, tie, id`;

/**
 * The keys of all work, their totals, and the keys of the page's rows: one statement. A page beyond the end of its group
 * is the last page.
 */
async function findKeys(work: Work, { kind, group, page }: ViewTodayInput, daysAhead: number): Promise<{ totals: WorkTotal[]; keys: Key[] }> {
  const days = siteDay(work, daysAhead);
  const [row] = await work.sql<{ totals: WorkTotal[]; keys: Key[] }>(
    `with ${days.text}, work as (${allWork}),
     placed as materialized (
       select work.*, s.today, s.time_zone, s.name as site_name,
         case when standing is not null then standing when due_on < s.today then 'late' when due_on = s.today then 'today' when due_on <= s.today + 7 then 'week' else 'later' end as "group"
       from work join site_day s on s.id = work.site_id),
     total as (select kind, "group", count(*)::int as count from placed group by kind, "group"),
     ordered as (
       select *, row_number() over (partition by "group" order by ${order}) as place, count(*) over (partition by "group") as of
       from placed where "group" = 'urgent' or (kind = any (?::text[]) and "group" = any (?::text[]))),
     shown as (
       select * from ordered where case when "group" = 'urgent' then place <= ${urgentRows} else (place - 1) / ${groupRows} = least(?::int, (of - 1) / ${groupRows}) end)
     select coalesce((select jsonb_agg(total) from total), '[]') as totals,
       coalesce((select jsonb_agg(jsonb_build_object('kind', kind, 'id', id, 'group', "group", 'code', code, 'dueOn', due_on, 'today', today, 'timeZone', time_zone, 'siteName', site_name) order by "group", place) from shown), '[]') as keys`,
    [...days.values, `{${kind === 'all' ? kinds.map((each) => each.kind).join(',') : kind}}`, `{${group ?? workGroups.join(',')}}`, page],
  );
  return { totals: row?.totals ?? [], keys: row?.keys ?? [] };
}

/** The work that waits: totals, and the rows asked for. One statement for the keys and one a kind for what the rows say. */
export async function listWork(work: Work, input: ViewTodayInput, daysAhead: number): Promise<WorkList> {
  const { totals, keys } = await findKeys(work, input, daysAhead);
  const days = siteDay(work, daysAhead);
  const items = new Map<string, WorkItem>();
  for (const kind of kinds) {
    const asked = new Map(keys.filter((key) => key.kind === kind.kind).map(({ kind: _, ...common }) => [common.id, common]));
    const rows = await work.sql<{ id: string }>(`with ${days.text}, asked as (select unnest(?::uuid[]) as id) ${kind.details}`, [...days.values, `{${[...asked.keys()].join(',')}}`]);
    for (const row of rows) {
      const common = asked.get(row.id);
      if (common) items.set(`${kind.kind} ${row.id}`, kind.item(row, common));
    }
  }
  return { totals, items: keys.flatMap(({ kind, id }) => items.get(`${kind} ${id}`) ?? []) };
}
