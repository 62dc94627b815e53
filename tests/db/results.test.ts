import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, test } from 'vitest';
import { addDays } from '@/instruments/calendar';
import type { Actor } from '@/lib/auth/roles';
import type { IncidenceView } from '@/lib/results/incidence';
import { viewResultsInput } from '@/lib/results/input';
import { viewResults, type ResultsView } from '@/lib/results/view-results';
import { readWeeklyLoads } from '@/lib/summary/weekly-loads';
import { withWork } from '@/lib/work/with-work';
import { givenParticipant, givenScene, givenScreening, givenStaff, setScene, type GivenScene, type GivenSite } from '../given';

interface Seen {
  readonly day: number;
  readonly verdict: 'met' | 'not met' | 'not judged';
  readonly extra?: true;
}

/** One person's story: what each complete assessment said. Day 0 is the baseline; a story without one has no baseline. */
type Story = readonly Seen[];

const enrolledOn = '2027-01-06';
const now = new Date('2029-06-01T12:00:00Z');

async function tell(scene: GivenScene, site: GivenSite, cohort: string, story: Story): Promise<string> {
  const who = await givenParticipant(site, scene.protocol, scene.coordinator, { enrolledOn, cohort });
  await setScene([site.id], async (work) => {
    for (const [index, { day, verdict, extra }] of story.entries()) {
      const on = addDays(enrolledOn, day);
      const [visit] =
        day === 0
          ? await work.sql<{ id: string }>(`update visit set state = 'complete', done_on = ? where participant_id = ? and key = 'baseline' returning id`, [on, who.id])
          : await work.sql<{ id: string }>(
              `insert into visit (site_id, participant_id, key, name, target_on, opens_on, closes_on, done_on, state, unscheduled_reason, protocol_version_id) values (?, ?, ?, 'Told', ?, ?, ?, ?, 'complete', ?, ?) returning id`,
              [site.id, who.id, `told-${index}`, on, on, on, on, extra ? 'Arm changed' : null, scene.protocol.id],
            );
      await work.sql(
        `insert into limb_assessment (site_id, participant_id, visit_id, assessor_id, measured_at, position, sleeve_worn, method, start_offset_mm, step_mm, level_count, tolerance_mm, state, left_volume_ml, right_volume_ml, verdicts, formula_version)
         values (?, ?, ?, ?, ?::timestamptz, 'seated', false, 'frustum', 0, 40, 3, 5, 'complete', 2000, 2000, ?::jsonb, '1.0.0')`,
        [site.id, who.id, visit?.id, scene.coordinator.accountId, `${on}T10:00:00Z`, JSON.stringify({ D1: { verdict }, D2: { verdict: day === 0 ? 'not judged' : 'not met' } })],
      );
    }
  });
  return who.id;
}

interface LeukaemiaCase {
  readonly id: string;
  readonly inputs: { readonly times: readonly number[]; readonly event: readonly (0 | 1)[] };
  readonly expected: { readonly table: readonly { readonly time: number; readonly n_event: number; readonly survival: number; readonly loglog: readonly [number, number] }[] };
}

/** The maintained arm of the leukaemia data (R survival::aml), case KM-02 of the clinical checks: weeks, and whether it came back. */
const km02 = (JSON.parse(readFileSync('tests/reference/clinical-checks.json', 'utf8')) as LeukaemiaCase[]).find(({ id }) => id === 'KM-02') as LeukaemiaCase;
const amlStories: Story[] = km02.inputs.times.map((day, row) => [day, km02.inputs.event[row]] as const).map(([day, event]) => [{ day: 0, verdict: 'not met' }, { day, verdict: event ? 'met' : 'not met' }]);

/** A registry small enough to be counted on paper. */
const small: Story[] = [
  [{ day: 0, verdict: 'met' }, { day: 90, verdict: 'met' }],
  [{ day: 90, verdict: 'met' }],
  [{ day: 0, verdict: 'not met' }],
  [{ day: 0, verdict: 'not met' }, { day: 60, verdict: 'not judged' }],
  [{ day: 0, verdict: 'not met' }, { day: 91, verdict: 'met' }, { day: 182, verdict: 'met' }],
  [{ day: 0, verdict: 'not met' }, { day: 91, verdict: 'met' }, { day: 182, verdict: 'not met' }, { day: 400, verdict: 'met' }],
  [{ day: 0, verdict: 'not met' }, { day: 100, verdict: 'met', extra: true }, { day: 190, verdict: 'not met' }],
  [{ day: 0, verdict: 'not met' }, { day: 200, verdict: 'not met' }, { day: 365, verdict: 'met' }, { day: 380, verdict: 'met', extra: true }, { day: 550, verdict: 'met' }],
  [{ day: 0, verdict: 'not met' }, { day: 210, verdict: 'not met' }],
  [{ day: 0, verdict: 'not met' }, { day: 365, verdict: 'not met' }, { day: 700, verdict: 'not judged' }],
  [{ day: 0, verdict: 'not met' }, { day: 730, verdict: 'not met' }],
];

/** The slow twin: follow-up from the stories, then the product limit one person at a time. Shares no code with the registry. */
function twin(stories: readonly Story[], confirmed: boolean): { n: number; events: number; shareBy(day: number): number } {
  const people: { time: number; swelled: boolean }[] = [];
  for (const story of stories) {
    const base = story.find(({ day }) => day === 0);
    if (!base || base.verdict === 'met') continue;
    const judged = story.filter(({ day, verdict }) => day > 0 && verdict !== 'not judged');
    if (judged.length === 0) continue;
    const scheduled = story.filter(({ day, extra }) => day > 0 && !extra);
    let onset = Infinity;
    if (confirmed) {
      for (let i = 0; i + 1 < scheduled.length; i += 1) if (scheduled[i]?.verdict === 'met' && scheduled[i + 1]?.verdict === 'met') onset = Math.min(onset, scheduled[i]?.day ?? Infinity);
    } else for (const { day, verdict } of judged) if (verdict === 'met') onset = Math.min(onset, day);
    people.push(onset < Infinity ? { time: onset, swelled: true } : { time: Math.max(...judged.map(({ day }) => day)), swelled: false });
  }
  const shareBy = (day: number) => {
    let free = 1;
    for (const time of [...new Set(people.filter(({ swelled }) => swelled).map((one) => one.time))].sort((a, b) => a - b)) {
      if (time > day) break;
      const atRisk = people.filter((one) => one.time >= time).length;
      const swelled = people.filter((one) => one.time === time && one.swelled).length;
      free *= 1 - swelled / atRisk;
    }
    return 1 - free;
  };
  return { n: people.length, events: people.filter(({ swelled }) => swelled).length, shareBy };
}

let scene: GivenScene;
let manager: Actor;
let investigator: Actor;
const see = (actor: Actor, asked: Record<string, string> = {}): Promise<ResultsView> =>
  withWork(actor, 'results.view', (work) => viewResults(work, viewResultsInput.parse({ first: 'D1', second: 'D2', ...asked })), { now });

beforeAll(async () => {
  scene = await givenScene({ cohorts: [{ key: 'leukaemia', name: 'Told from KM-02' }, { key: 'small', name: 'Counted on paper' }] });
  const sites = [scene.site, scene.otherSite];
  manager = await givenStaff('data-manager', sites);
  investigator = await givenStaff('investigator', sites);
  for (const story of amlStories) await tell(scene, scene.site, 'leukaemia', story);
  const ids: string[] = [];
  for (const story of small) ids.push(await tell(scene, scene.otherSite, 'small', story));
  await setScene([scene.otherSite.id], async (work) => {
    for (const [index, id] of ids.entries())
      for (const [session, day] of [0, 3, 7, 15].entries()) {
        const [row] = await work.sql<{ id: string }>(
          `insert into training_session (site_id, participant_id, local_on, time_zone, entered_at, arm_check, soreness, client_key) values (?, ?, ?, 'UTC', now(), 'the same', 'no', gen_random_uuid()) returning id`,
          [scene.otherSite.id, id, addDays('2027-02-01', day)],
        );
        for (const [sequence, load, equipment] of [[1, 1 + session + index / 10, 'dumbbell'], [2, 30, 'machine'], [3, 0, 'body weight']] as const)
          if (equipment === 'dumbbell' || index < 2)
            await work.sql(
              `insert into training_set (site_id, participant_id, session_id, sequence, exercise, equipment, basis, side, load_typed, unit, load_g, repetitions, set_count) values (?, ?, ?, ?, 'chest-press', ?, 'per hand', 'both', ?, 'kg', ?, 10, 3)`,
              [scene.otherSite.id, id, row?.id, sequence, equipment, load, Math.round(load * 1000)],
            );
        if (session === 2 && index < 3)
          for (const [rule, state] of [['STEP_OVER', 'raised'], ['ASSESSMENT_REQUIRED', 'raised'], ['STEP_HARD', 'withdrawn']])
            await work.sql(`insert into training_flag (site_id, participant_id, session_id, flag_key, rule, state, raised_at) values (?, ?, ?, ?, ?, ?, now())`, [scene.otherSite.id, id, row?.id, `${rule}-${session}`, rule, state]);
      }
  });
  for (const [reason, count] of [['Not eligible', 6], ['Declined: no time', 2], ['Could not be reached', 1]] as const)
    for (let one = 0; one < count; one += 1) {
      const screening = await givenScreening(scene.site, scene.protocol, { cohort: 'small' });
      await setScene([scene.site.id], (work) => work.sql(`update screening set state = 'not enrolled', not_enrolled_reason = ? where id = ?`, [reason, screening.id]));
    }
});

describe('cumulative incidence', () => {
  test('of the leukaemia data, told as a registry, is what is published', async () => {
    const view = (await see(manager, { cohort: 'leukaemia' })).incidence[0];
    const published = km02.expected.table.filter(({ n_event }) => n_event > 0);
    expect(view.steps.map(({ day }) => day)).toEqual(published.map(({ time }) => time));
    for (const [index, { survival, loglog }] of published.entries()) {
      const step = view.steps[index];
      expect(1 - (step?.share ?? NaN)).toBeCloseTo(survival, 8);
      expect([1 - (step?.upper ?? NaN), 1 - (step?.lower ?? NaN)].map((limit) => Number(limit.toFixed(7)))).toEqual(loglog.map((limit) => Number(limit.toFixed(7))));
    }
    expect(view).toMatchObject({ n: 11, events: 7, lastDay: 161 });
  });

  test.each(['first visit', 'confirmed at the next visit'] as const)('of the small registry is the twin’s, %s', async (confirmation) => {
    const [view] = (await see(manager, { cohort: 'small', confirmation })).incidence;
    const slow = twin(small, confirmation !== 'first visit');
    expect(view).toMatchObject({ n: slow.n, events: slow.events });
    expect(slow.events).toBeGreaterThan(1);
    for (const { day, share } of view.steps) expect(share).toBeCloseTo(slow.shareBy(day), 12);
    expect(view.steps.at(-1)?.share).toBeCloseTo(slow.shareBy(10_000), 12);
    for (const { months, share } of view.at) if (share !== null) expect(share).toBeCloseTo(slow.shareBy(months * 30.4375), 12);
    expect(view.at[0]?.share).not.toBeNull();
    expect(view.leftOut).toEqual(expect.arrayContaining([{ reason: 'no complete baseline', count: 1 }, { reason: 'swelling at baseline already', count: 1 }, { reason: 'no judged assessment after baseline', count: 2 }]));
  });

  test('of nobody is empty, not an error', async () => {
    const other = await givenScene();
    const view = await see(await givenStaff('site-investigator', other.site));
    expect(view.incidence[0]).toMatchObject({ n: 0, events: 0, steps: [], lastDay: 0 });
    expect(view.adherence).toMatchObject({ weeks: 0, kept: { share: null } });
    expect(view.loads).toEqual([]);
  });

  test('of a site investigator is of the own site', async () => {
    const own = await givenStaff('site-investigator', scene.otherSite);
    expect((await see(own)).incidence[0].n).toBe(twin(small, false).n);
    expect((await see(own, { siteId: scene.site.id })).incidence[0].n).toBe(0);
    expect((await see(manager)).incidence[0].n).toBe(twin(small, false).n + 11);
  });
});

describe('the participant flow', () => {
  test('adds up from stage to stage', async () => {
    const { flow } = await see(manager, { cohort: 'small' });
    expect(flow.map(({ name, people }) => [name, people])).toEqual([['Screened', 20], ['Enrolled', 11], ['Baseline done', 10], ['Month 6 seen', 7], ['Month 12 seen', 4], ['Month 24 seen', 2]]);
    for (const [index, stage] of flow.entries()) {
      const next = flow[index + 1];
      const gone = (stage.out?.reasons ?? []).reduce((sum, { count }) => sum + (count ?? NaN), 0);
      if (next) expect(gone).toBe(stage.people - next.people);
    }
  });
});

describe('load and rules', () => {
  test('bands are quantiles of one kind of equipment, by week since the first session', async () => {
    const [press] = (await see(manager, { cohort: 'small' })).loads;
    expect(press).toMatchObject({ exercise: 'chest-press', equipment: 'dumbbell', n: 33, otherEquipment: 6 });
    // Heaviest of week 1 is the second session: 2 + i/10 kg for i = 0…10; the median is 2.5, the quartiles 2.25 and 2.75 (type 7).
    expect(press?.weeks.map(({ week, people }) => [week, people])).toEqual([[1, 11], [2, 11], [3, 11]]);
    expect(press?.weeks[0]?.p50).toBeCloseTo(2.5, 10);
    expect(press?.weeks[0]?.p25).toBeCloseTo(2.25, 10);
    expect(press?.weeks[2]?.p90).toBeCloseTo(4.9, 10);
    const loads = await withWork(manager, 'results.view', (work) => readWeeklyLoads(work));
    expect(loads.map(({ equipment }) => equipment)).toEqual(['dumbbell', 'machine']);
  });

  test('a week counts as broken once, withdrawn flags and rules of another kind do not', async () => {
    const { adherence } = await see(manager, { cohort: 'small' });
    expect(adherence).toMatchObject({ weeks: 33, people: 11, kept: { count: 30 } });
    expect(adherence.kept.share).toBeCloseTo(30 / 33, 12);
    expect(adherence.broken.filter(({ count }) => count !== 0).map(({ rule, count }) => [rule, count])).toEqual([['STEP_OVER', 3]]);
    // Ratio estimator by hand: 3 people with 2 of 3 weeks, 8 with 3 of 3; residuals y - p·3.
    const p = 30 / 33;
    const squares = 3 * (2 - p * 3) ** 2 + 8 * (3 - p * 3) ** 2;
    const se = Math.sqrt((squares / 33 ** 2) * (11 / 10));
    // t(10) at 0.975 is 2.228139 (printed tables).
    expect(adherence.kept.lower).toBeCloseTo(p - 2.228139 * se, 5);
  });
});

describe('the study investigator', () => {
  const smallCounts = (view: unknown): string[] => {
    const found: string[] = [];
    const walk = (value: unknown, path: string): void => {
      if (typeof value === 'number' && /(count|people|events|atRisk(\.\d+)?|\.n|weeks)$/.test(path) && value > 0 && value < 5) found.push(`${path}=${value}`);
      else if (typeof value === 'object' && value !== null) for (const [name, one] of Object.entries(value)) walk(one, `${path}.${name}`);
    };
    walk(view, '');
    return found;
  };

  test('sees no count from one to four, and nobody else has any hidden', async () => {
    for (const cohort of ['leukaemia', 'small']) expect(smallCounts(await see(investigator, { cohort }))).toEqual([]);
    expect(smallCounts(await see(manager, { cohort: 'small' })).length).toBeGreaterThan(3);
  });

  test('cannot get one back by subtraction in the flow', async () => {
    const { flow } = await see(investigator, { cohort: 'small' });
    for (const [index, stage] of flow.entries()) {
      const before = flow[index - 1];
      if (before) expect([0, 5]).toContain(Math.min(5, before.people - stage.people));
      const hidden = (stage.out?.reasons ?? []).filter(({ count }) => count === null);
      if (hidden.length > 0) expect(stage.out?.reasons).toHaveLength(1);
    }
  });

  test('sees no share that rests on fewer than five people, and no curve past them', async () => {
    const view: IncidenceView = (await see(investigator, { cohort: 'small' })).incidence[0];
    const plain: IncidenceView = (await see(manager, { cohort: 'small' })).incidence[0];
    for (const { events, share } of view.at) if (events === null) expect(share).toBeNull();
    expect(view.lastDay).toBeLessThan(plain.lastDay);
    // Four people of the small registry swell at any visit: no step may be shown.
    expect(plain.steps.length).toBeGreaterThan(2);
    expect(view.steps).toEqual([]);
    expect(view.steps.every(({ day }) => day <= view.lastDay)).toBe(true);
  });
});

describe('who may', () => {
  test('participant, monitor and coordinator see no results', async () => {
    for (const actor of [scene.coordinator, await givenStaff('monitor', scene.site)]) await expect(see(actor)).rejects.toMatchObject({ code: 'forbidden' });
  });
});

describe('a small count by subtraction', () => {
  // Of 20 enrolled 16 are at risk: the other cohort has 4, which neither view may give away.
  let planted: GivenScene;
  let other: Actor;
  let whole: Actor;
  const view = (actor: Actor, asked: Record<string, string> = {}) => see(actor, asked);
  const stage = ({ flow }: ResultsView, name: string) => flow.find((one) => one.name === name)?.people ?? null;

  beforeAll(async () => {
    planted = await givenScene({ cohorts: [{ key: 'at-risk', name: 'At risk' }, { key: 'swelling', name: 'With swelling' }] });
    other = await givenStaff('investigator', [planted.site, planted.otherSite]);
    whole = await givenStaff('data-manager', [planted.site, planted.otherSite]);
    for (let index = 0; index < 9; index += 1) await tell(planted, planted.site, 'at-risk', [{ day: 0, verdict: 'not met' }, { day: 200, verdict: index < 6 ? 'met' : 'not met' }]);
    for (let index = 0; index < 7; index += 1) await tell(planted, planted.otherSite, 'at-risk', [{ day: 0, verdict: 'not met' }, { day: 200, verdict: 'not met' }]);
    for (let index = 0; index < 4; index += 1) await tell(planted, planted.site, 'swelling', [{ day: 0, verdict: 'not met' }, { day: 200, verdict: 'met' }]);
  });

  test('is there to be had for who may read rows', async () => {
    const [all, atRisk] = [await view(whole), await view(whole, { cohort: 'at-risk' })];
    expect([stage(all, 'Enrolled'), stage(atRisk, 'Enrolled')]).toEqual([20, 16]);
    expect(await view(whole, { cohort: 'at-risk', siteId: planted.site.id })).toMatchObject({ suppressBelow: 0 });
  });

  test('of one cohort at one site is refused', async () => {
    await expect(view(other, { cohort: 'at-risk', siteId: planted.site.id })).rejects.toMatchObject({ code: 'invalid', field: 'cohort', sentence: expect.stringMatching(/not both/) as string });
  });

  test('is covered in each part and at every stage, curve and count', async () => {
    const all = await view(other);
    const parts = [[await view(other, { cohort: 'at-risk' }), await view(other, { cohort: 'swelling' })], [await view(other, { siteId: planted.site.id }), await view(other, { siteId: planted.otherSite.id })]];
    expect(stage(all, 'Enrolled')).toBe(20);
    const counts = (seen: ResultsView): Record<string, number | null> => ({
      ...Object.fromEntries(seen.flow.map(({ name, people }) => [`flow ${name}`, people])),
      ...Object.fromEntries(seen.incidence.flatMap(({ code, n, events, at, atRisk }) => [[`${code} n`, n], [`${code} events`, events], ...at.map((read) => [`${code} events ${read.months}`, read.events]), ...atRisk.map((count, index) => [`${code} risk ${index}`, count])])),
    });
    let compared = 0;
    for (const family of parts)
      for (const [name, total] of Object.entries(counts(all))) {
        if (total === null) continue;
        const known = family.map((part) => counts(part)[name]).filter((count) => count !== null && count !== undefined);
        const rest = total - known.reduce((sum, count) => sum + count, 0);
        if (known.length > 0) compared += 1;
        expect(rest === 0 || rest >= 5, `${name}: ${total} less ${known.join(' and ')}`).toBe(true);
      }
    expect(compared).toBeGreaterThan(5);
    const [[atRisk] = []] = parts;
    expect(atRisk && stage(atRisk, 'Enrolled')).toBeNull();
    expect(atRisk?.incidence[0]).toMatchObject({ n: null, events: null, steps: [] });
  });
});
