import { addDays, daysBetween, type LocalDate, mondayOf } from '@/instruments/calendar';
import { allowedLoad } from '@/instruments/training/allowed-load';
import type { ArmState, PastLoad } from '@/instruments/training/define-training-rule';
import { findExercise, type Equipment, type LoadBasis } from '@/instruments/training/exercises';
import { massToKg, roundKg } from '@/instruments/units';
import { minutesAfter } from './clock';
import type { Course } from './course';
import type { Draw } from './draw';
import type { Person } from './person';
import type { Plan } from './plan';
import { makeReport, type Report } from './reports';

export interface LoggedSet {
  readonly exercise: string;
  readonly equipment: Equipment;
  readonly basis: LoadBasis;
  readonly typed: number;
  readonly unit: 'kg' | 'lb';
  readonly loadG: number;
  readonly repetitions: number;
  readonly setCount: number;
  readonly effort: number;
  readonly alreadyLifted: boolean;
}

export interface LoggedSession {
  readonly id: string;
  readonly clientKey: string;
  readonly on: LocalDate;
  readonly enteredAt: Date;
  readonly late: boolean;
  readonly armCheck: 'the same' | 'a little fuller' | 'clearly fuller' | 'not sure';
  readonly soreness: 'no' | 'a little' | 'a lot';
  readonly effort: number;
  readonly note: string | null;
  readonly sets: readonly LoggedSet[];
}

/** How one person trains. */
interface Habit {
  readonly weekdays: readonly number[];
  readonly unit: 'kg' | 'lb';
  readonly raises: number;
  readonly careless: number;
  readonly ceilingsKg: readonly number[];
  readonly startsKg: readonly number[];
  readonly stopsAfterWeeks: number;
}

function inventHabit(draw: Draw): Habit {
  return {
    weekdays: draw.pick([[1, 4], [2, 5], [1, 3], [2, 6], [3, 7], [2, 4]]),
    unit: draw.chance(0.06) ? 'lb' : 'kg',
    raises: draw.between(0.12, 0.5, 0.27, 0.09),
    careless: draw.chance(0.12) ? 0.03 : 0.003,
    ceilingsKg: [draw.between(3.5, 14, 7, 2.2), draw.between(4, 18, 9, 2.8), draw.between(2, 9, 4.5, 1.3)],
    startsKg: [draw.pick([1, 1.5, 2]), draw.pick([1, 1.5, 2]), draw.pick([1, 1, 1.5])],
    stopsAfterWeeks: draw.chance(0.16) ? draw.whole(6, 80) : 500,
  };
}

/** The load rules look no further back than the last week trained in. */
const recentSessions = 16;

interface Life {
  readonly plan: Plan;
  readonly person: Person;
  readonly draw: Draw;
  readonly ids: Draw;
  readonly habit: Habit;
  readonly course: Course;
  readonly assessedOn: readonly LocalDate[];
  readonly histories: Map<string, PastLoad[]>;
  readonly reports: Report[];
}

/** Trains from the baseline up to `until` (not after), adding to `reports` what the arm check brings up. */
export function liveTraining(input: Pick<Life, 'plan' | 'person' | 'ids' | 'course' | 'assessedOn' | 'reports'> & { from: LocalDate; until: LocalDate }): LoggedSession[] {
  const draw = input.person.draw('training');
  const habit = inventHabit(draw);
  const life: Life = { ...input, draw, habit: input.person.cast ? { ...habit, careless: 0, stopsAfterWeeks: 500, unit: 'kg' } : habit, histories: new Map() };
  const firstMonday = mondayOf(addDays(input.from, 4));
  const weeks = Math.min(Math.floor(daysBetween({ from: firstMonday, to: input.until }) / 7) + 1, input.plan.logWeeks, life.habit.stopsAfterWeeks);
  const sessions: LoggedSession[] = [];
  let away = 0;
  for (let week = 0; week < weeks; week += 1) {
    away = weeksAway(life, week, away);
    if (away > 0) continue;
    for (const day of life.habit.weekdays) {
      const on = addDays(firstMonday, week * 7 + day - 1);
      if (on <= input.from || on > input.until || !comes(life, on)) continue;
      const session = train(life, on, week);
      if (session) sessions.push(session);
    }
  }
  return sessions;
}

function weeksAway({ draw, person }: Life, week: number, away: number): number {
  const begins = draw.chance(0.03);
  const lasts = draw.whole(2, 6);
  if (person.cast?.breaks) return person.cast.breaks.some(([first, weeks]) => week >= first && week < first + weeks) ? 1 : 0;
  if (away > 1) return away - 1;
  return begins && week > 3 ? lasts : 0;
}

const isHeld = (reports: readonly Report[], on: LocalDate): boolean => reports.some(({ on: told, heldUntil }) => heldUntil !== null && told < on && on < heldUntil);

function comes({ draw, person, reports }: Life, on: LocalDate): boolean {
  const wish = draw.uniform(0, 1);
  return wish < (isHeld(reports, on) ? 0.08 : person.diligence);
}

function train(life: Life, on: LocalDate, week: number): LoggedSession | null {
  const { plan, person, draw, ids } = life;
  const { timeZone } = person.site;
  const delayDays = draw.weighted([[0, 84], [1, 9], [2, 3], [4, 2], [6, 2]]);
  const enteredAt = plan.clock.at(addDays(on, delayDays), draw.whole(1010, 1320), timeZone);
  if (!plan.clock.isPast(enteredAt)) return null;
  const armCheck = feel(life, on);
  const arm: ArmState = armCheck.endsWith('fuller') ? 'changed' : isHeld(life.reports, on) ? 'waiting' : armCheck === 'not sure' ? 'unknown' : 'clear';
  const sets = plan.protocol.exercises.flatMap((exercise, index) => lift(life, { exercise, index, on, week, arm }));
  if (arm === 'changed') {
    life.reports.push(makeReport(plan, person, draw, ids, { at: minutesAfter(enteredAt, draw.whole(0, 1)), signs: [], armCheck }));
  }
  return {
    id: ids.uuid(), clientKey: ids.uuid(), on, enteredAt, late: plan.clock.at(addDays(on, 1), plan.protocol.lateAfterHours * 60, timeZone) < enteredAt, armCheck, sets,
    soreness: draw.weighted([['no', 68], ['a little', 28], ['a lot', 4]]),
    effort: Math.round(draw.between(2, 8, 4.4, 1.2)),
    note: draw.chance(0.04) ? draw.pick(['Felt strong today.', 'Tired after a long week.', 'Shorter than planned.', 'Trained at the gym with a friend.', 'Shoulder a bit stiff at the start.']) : null,
  };
}

/** The answer to the arm check: rarely a change, more often while the arm truly grows. */
function feel({ draw, person, course, assessedOn, reports }: Life, on: LocalDate): LoggedSession['armCheck'] {
  const day = daysBetween({ from: person.enrolledOn, to: on });
  const last = assessedOn.filter((date) => date < on).at(-1) ?? person.enrolledOn;
  const grown = course(day) - course(daysBetween({ from: person.enrolledOn, to: last }));
  const recently = reports.some(({ on: told, heldUntil }) => heldUntil !== null && daysBetween({ from: told, to: on }) < 45);
  const share = person.cast ? 0 : Math.min(0.2, 0.0022 + Math.max(0, grown - 0.01) * 1.6) * (recently ? 0.1 : 1);
  const answer = draw.uniform(0, 1);
  const clearly = draw.chance(0.15);
  if (answer < share) return clearly ? 'clearly fuller' : 'a little fuller';
  return answer > 0.985 ? 'not sure' : 'the same';
}

function lift(life: Life, { exercise, index, on, week, arm }: { exercise: string; index: number; on: LocalDate; week: number; arm: ArmState }): LoggedSet[] {
  const { plan, person, draw, habit, histories } = life;
  const known = findExercise(exercise);
  if (!known || (index === 2 && draw.chance(0.12))) return [];
  const past = histories.get(exercise) ?? [];
  const allowed = allowedLoad(past.slice(-recentSessions), on, arm, plan.protocol.training);
  const jump = person.cast?.jump?.week === week && index === 0 && allowed.basis === 'new week' ? person.cast.jump.extraKg : 0;
  const isCareless = jump > 0 || draw.chance(habit.careless);
  const wantedKg = jump > 0 ? (allowed.lastWeekKg ?? 0) + jump : wanted(life, { allowed, index, isCareless });
  const load = asTyped(wantedKg, habit.unit, isCareless ? Infinity : Math.max(allowed.upToKg, 0.5));
  histories.set(exercise, [...past, { on, load: roundKg(massToKg(load.typed, load.unit)) }]);
  return [{
    exercise, equipment: known.equipment[0] as Equipment, basis: known.basis, ...load,
    repetitions: draw.pick([8, 10, 10, 10, 12]), setCount: week < 4 ? 2 : draw.pick([2, 3, 3]), effort: Math.round(draw.between(2, 9, 4.5, 1.3)), alreadyLifted: isCareless,
  }];
}

function wanted({ draw, habit, plan }: Life, { allowed, index, isCareless }: { allowed: ReturnType<typeof allowedLoad>; index: number; isCareless: boolean }): number {
  const step = draw.weighted([[0.5, 5], [1, 4], [1.5, 0.6], [2, 0.4]]);
  const raises = draw.chance(habit.raises);
  const over = draw.weighted([[0.5, 4], [1, 3], [3, 0.4]]);
  const start = habit.startsKg[index] ?? 1;
  if (allowed.basis === 'first session') return isCareless ? plan.protocol.training.startKg + over : start;
  const lastKg = allowed.lastKg ?? start;
  if (isCareless) return allowed.basis === 'after a break' ? lastKg : Math.max(lastKg, allowed.upToKg) + over;
  if (allowed.hold) return Math.max(0.5, Math.min(lastKg * 0.75, allowed.upToKg));
  if (allowed.basis === 'after a break') return allowed.proposedKg;
  const goesUp = raises && allowed.basis === 'new week' && lastKg + 0.5 <= (habit.ceilingsKg[index] ?? 6);
  return Math.min(goesUp ? lastKg + step : (allowed.basis === 'same week' ? allowed.upToKg : lastKg), allowed.upToKg);
}

/** Half kilograms, or whole pounds for those who own pounds. */
function asTyped(kg: number, unit: 'kg' | 'lb', upToKg: number): Pick<LoggedSet, 'typed' | 'unit' | 'loadG'> {
  const perUnit = massToKg(1, unit);
  const step = unit === 'kg' ? 0.5 : 1;
  const nearest = Math.max(step, Math.round(kg / perUnit / step) * step);
  const typed = nearest * perUnit > upToKg + 1e-6 && nearest > step ? nearest - step : nearest;
  return { typed, unit, loadG: Math.round(typed * perUnit * 1000) };
}
