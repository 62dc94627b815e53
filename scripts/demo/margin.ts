import { addDays, daysBetween, type LocalDate, weekday } from '@/instruments/calendar';
import { printGirthCm } from '@/instruments/numbers';
import { minutesAfter } from './clock';
import { localDate } from '@/lib/work/time';
import type { Draw } from './draw';
import { type DemoEvent, type Doer, eventBy, inserted, type Row, updated } from './events';
import type { Person } from './person';
import type { Plan } from './plan';
import { correctionOf, type Sitting } from './sitting';
import type { PlannedVisit } from './visit-plan';

/** A question worth asking, and how it would be answered. */
export interface Doubt {
  readonly visitId: string | null;
  readonly table: 'limb_assessment' | 'limb_trial' | 'visit';
  readonly targetId: string;
  readonly field: string;
  readonly label: string;
  readonly question: string;
  readonly answer: string;
  readonly check: string | null;
  /** Not asked before this day. */
  readonly from: LocalDate;
  readonly correction?: { readonly changes: DemoEvent['changes']; readonly reason: string };
  /** Days ago on which things happened, where the story fixes them; null = not yet. */
  readonly script?: { readonly raised: number; readonly answered: number | null; readonly closed: number | null };
}

interface Scene { readonly plan: Plan; readonly person: Person; readonly draw: Draw; readonly ids: Draw }

/** As lib/queries/targets names a girth. */
const trialLabel = ({ side, level, trial }: { side: string; level: number; trial: number }): string => `${side === 'left' ? 'Left' : 'Right'} arm at ${level * 4} cm, trial ${trial}`;

/** What a careful monitor would ask about one sitting. */
export function doubtsAbout({ plan, person, draw }: Scene, sitting: Sitting): Doubt[] {
  const { visit, slip, assessmentId, asEntered } = sitting;
  const base = { visitId: visit.id, from: addDays(asEntered.on, 2) };
  // The monitor looks more closely at what is new.
  const eager = plan.clock.age(asEntered.on, person.site.timeZone) < 45 ? 3 : 1;
  const doubts: Doubt[] = [];
  if (slip) {
    const correction = correctionOf(sitting);
    doubts.push(
      slip.kind === 'weight'
        ? { ...base, table: 'limb_assessment', targetId: assessmentId, field: 'body_weight_g', label: 'Body weight', question: `${(slip.wrongG / 1000).toFixed(1)} kg is far from the visit before. Correct?`, answer: 'Digits changed places. Corrected from the scale sheet.', check: 'weight-change', correction }
        : { ...base, table: 'limb_trial', targetId: slip.trialId, field: `circumferences_mm.${slip.level}`, label: trialLabel(slip), question: `Trials ${printGirthCm(Math.abs(slip.wrongMm - slip.rightMm))} cm apart. Had the arm moved?`, answer: `Yes. The paper sheet has ${printGirthCm(slip.rightMm)}; trial ${slip.trial} corrected.`, check: null, correction },
    );
  }
  if (draw.chance(0.07 * eager)) doubts.push({ ...base, table: 'limb_assessment', targetId: assessmentId, field: 'sleeve_worn', label: 'Sleeve worn in the last 12 hours', question: 'The log has the sleeve on the evening before. Which is right, the form or the log?', answer: 'The form. The sleeve came off at noon the day before.', check: null });
  if (draw.chance(0.04 * eager) && asEntered.impedanceRatio !== null) doubts.push({ ...base, table: 'limb_assessment', targetId: assessmentId, field: 'impedance_ratio', label: 'Impedance ratio', question: `Ratio ${asEntered.impedanceRatio.toFixed(2)}. Were the leads on the right arm?`, answer: 'Repeated the same day with the same figure. Confirmed as measured.', check: 'ratio-range' });
  const girth = asEntered.trials.find(({ side, trial }) => side === person.facts.affectedSide && trial === 1);
  const level = draw.whole(6, 9);
  if (draw.chance(0.04 * eager) && girth) doubts.push({ ...base, table: 'limb_trial', targetId: sitting.trialIds.get(`${girth.side} 1`) ?? '', field: `circumferences_mm.${level}`, label: trialLabel({ ...girth, level }), question: 'Far from the visit before, with the weight unchanged. Read twice?', answer: 'Read twice, as on the sheet. Confirmed as measured.', check: null });
  if (visit.outcome.kind === 'done' && visit.outcome.on > visit.closesOn && draw.chance(0.6)) {
    doubts.push({ ...base, table: 'visit', targetId: visit.id, field: 'done_on', label: 'Date of visit', question: `${daysBetween({ from: visit.closesOn, to: visit.outcome.on })} days past the window. Why so late?`, answer: 'First appointment was cancelled by the participant; this was the next free one.', check: 'visit-window' });
  }
  return doubts;
}

/** The scripted queries of the participant in the middle of the programme. */
export function storyDoubts(sittings: readonly Sitting[]): Doubt[] {
  const sitting = sittings.find(({ visit }) => visit.key === 'month-6');
  if (sitting?.slip?.kind !== 'trial') return [];
  const { slip } = sitting;
  const base = { visitId: sitting.visit.id, from: sitting.asEntered.on, check: null };
  const assessment = { ...base, table: 'limb_assessment' as const, targetId: sitting.assessmentId };
  return [
    { ...assessment, field: 'impedance_rest_min', label: 'Lying down for', question: 'Ten minutes before the reading, or five?', answer: 'Ten, by the clinic clock.', script: { raised: 40, answered: 37, closed: 18 } },
    { ...base, table: 'limb_trial', targetId: slip.trialId, field: `circumferences_mm.${slip.level}`, label: trialLabel(slip), question: 'Trials 1.7 cm apart at 24 cm. Had the elbow moved?', answer: `Yes, it bent. The paper sheet has ${printGirthCm(slip.rightMm)}; trial 2 corrected.`, correction: correctionOf(sitting), script: { raised: 19, answered: 1, closed: null } },
    { ...assessment, field: 'sleeve_worn', label: 'Sleeve worn in the last 12 hours', question: 'The training log has the sleeve on until evening. Which is right, the form or the log?', answer: '', script: { raised: 14, answered: null, closed: null } },
  ];
}

const office = (date: LocalDate): LocalDate => addDays(date, weekday(date) === 6 ? 2 : weekday(date) === 7 ? 1 : 0);

/** The life of one query, up to now. */
export function queryEvents({ plan, person, draw, ids }: Scene, doubt: Doubt): DemoEvent[] {
  const { site } = person;
  const { monitor, dataManager } = plan;
  const asker = doubt.check && draw.chance(0.3) ? dataManager : monitor;
  const times = timesOf({ plan, person, draw, ids }, doubt);
  if (!plan.clock.isPast(times.raised)) return [];
  const id = ids.uuid();
  const say = (by: Doer, at: Date, kind: string, text: string): Row => ({
    id: ids.uuid(), site_id: site.id, participant_id: person.id, query_id: id, author_id: by.accountId, author_role: by.role, author_label: by.label, kind, text, at: at.toISOString(),
  });
  const raised: Row = {
    id, site_id: site.id, participant_id: person.id, visit_id: doubt.visitId, target_table: doubt.table, target_id: doubt.targetId, field: doubt.field, field_label: doubt.label,
    origin: doubt.check ? 'check' : 'manual', check_id: doubt.check, state: 'open', raised_by: asker.accountId, raised_at: times.raised.toISOString(),
    due_on: addDays(localDate(times.raised, 'UTC'), plan.protocol.queryDueDays),
  };
  const step = (by: Doer, at: Date, act: string, row: Row, kind: string, text: string): DemoEvent => eventBy(by, at, act, [updated('data_query', { id, ...row }), inserted('query_message', say(by, at, kind, text))]);
  const events = [eventBy(asker, times.raised, 'query.raise', [inserted('data_query', raised), inserted('query_message', say(asker, times.raised, 'question', doubt.question))])];
  if (times.reminded) events.push(eventBy(asker, times.reminded, 'query.remind', [inserted('query_message', say(asker, times.reminded, 'remind', 'Reminded.'))]));
  if (times.cancelled) return [...events, step(asker, times.cancelled, 'query.cancel', { state: 'cancelled', closed_at: times.cancelled.toISOString() }, 'cancel', 'Asked in error; the value is in range.')].filter(({ at }) => plan.clock.isPast(at));
  if (times.answered) {
    if (doubt.correction) events.push(eventBy(site.coordinator, minutesAfter(times.answered, -6), doubt.table === 'visit' ? 'visit.correct' : 'assessment.correct', doubt.correction.changes, doubt.correction.reason));
    events.push(step(site.coordinator, times.answered, 'query.answer', { state: 'answered', answered_at: times.answered.toISOString() }, 'answer', doubt.answer));
  }
  if (times.again) events.push(step(asker, times.again, 'query.ask-again', { state: 'open' }, 'ask again', 'Which sheet was it read from? Please name the page.'));
  if (times.answeredAgain) events.push(step(site.coordinator, times.answeredAgain, 'query.answer', { state: 'answered', answered_at: times.answeredAgain.toISOString() }, 'answer', 'The visit sheet, page 2.'));
  if (times.closed) events.push(step(asker, times.closed, 'query.close', { state: 'closed', closed_at: times.closed.toISOString() }, 'close', doubt.correction ? 'Value agrees with the source.' : 'Explained.'));
  return events.filter(({ at }) => plan.clock.isPast(at));
}

interface Times { raised: Date; raisedOn: LocalDate; reminded?: Date; cancelled?: Date; answered?: Date; again?: Date; answeredAgain?: Date; closed?: Date }

function timesOf({ plan, person, draw }: Scene, doubt: Doubt): Times {
  const { timeZone } = person.site;
  const at = (on: LocalDate): Date => plan.clock.at(office(on), draw.whole(545, 1010), timeZone);
  if (doubt.script) {
    const ago = (days: number): Date => plan.clock.at(addDays(plan.clock.today(timeZone), -days), 560, timeZone);
    const { raised, answered, closed } = doubt.script;
    return { raised: ago(raised), raisedOn: addDays(plan.clock.today(timeZone), -raised), ...(answered !== null && { answered: ago(answered) }), ...(closed !== null && { closed: ago(closed) }) };
  }
  const raisedOn = office(addDays(doubt.from, draw.wait(16, 1)));
  const answeredOn = office(addDays(raisedOn, draw.wait(person.site.answerDays, 1)));
  const raised = at(raisedOn);
  const answered = at(answeredOn);
  const reminded = daysBetween({ from: raisedOn, to: answeredOn }) > plan.protocol.queryDueDays ? { reminded: at(addDays(raisedOn, plan.protocol.queryDueDays)) } : {};
  const fate = draw.uniform(0, 1);
  if (fate < 0.06 && !doubt.correction) return { raised, raisedOn, cancelled: at(addDays(raisedOn, draw.wait(4, 1))) };
  const closeWait = draw.wait(6, 1);
  if (fate < 0.16) {
    const againOn = addDays(answeredOn, draw.wait(4, 1));
    const secondOn = addDays(againOn, draw.wait(person.site.answerDays, 1));
    return { raised, raisedOn, ...reminded, answered, again: at(againOn), answeredAgain: at(secondOn), closed: at(addDays(office(secondOn), closeWait)) };
  }
  return { raised, raisedOn, ...reminded, answered, closed: at(addDays(answeredOn, closeWait)) };
}

/** First day on which the monitor is at a site, at or after a date: every four weeks. */
function monitoringDay(plan: Plan, { site }: Person, from: LocalDate): LocalDate {
  const first = addDays(plan.startsOn, 20 + site.index * 9);
  const since = daysBetween({ from: first, to: from });
  return office(addDays(first, Math.max(0, Math.ceil(since / 28)) * 28));
}

/** Marks of a value seen at source, and the few that fell because the value changed afterwards. */
export function verificationEvents({ plan, person, draw, ids }: Scene, visits: readonly PlannedVisit[], sittings: readonly Sitting[]): DemoEvent[] {
  return sittings.flatMap((sitting) => {
    const on = monitoringDay(plan, person, addDays(sitting.asEntered.on, 12));
    // The tape is checked in one sitting of three, the rest in nearly all: by risk, not everything everywhere.
    const [skipped, readsTape, changes, minutes, wait] = [draw.chance(0.2), draw.chance(0.34), draw.chance(0.04), draw.whole(560, 960), draw.whole(1, 25)];
    const at = plan.clock.at(on, minutes, person.site.timeZone);
    if (skipped || !plan.clock.isPast(at) || !visits.some(({ id }) => id === sitting.visit.id)) return [];
    const mark = (target_table: string, target_id: string, field: string, value: Row[string]): Row => ({
      id: ids.uuid(), site_id: person.site.id, participant_id: person.id, visit_id: sitting.visit.id, target_table, target_id, field, value,
      verified_by: plan.monitor.accountId, verified_label: plan.monitor.label, verified_at: at.toISOString(),
    });
    const { slip, assessmentId, asEntered } = sitting;
    const rows = [
      mark('visit', sitting.visit.id, 'done_on', asEntered.on),
      ...(slip?.kind === 'weight' ? [] : [mark('limb_assessment', assessmentId, 'body_weight_g', asEntered.bodyWeightG)]),
      ...(asEntered.impedanceRatio === null ? [] : [mark('limb_assessment', assessmentId, 'impedance_ratio', asEntered.impedanceRatio)]),
      mark('limb_assessment', assessmentId, 'sleeve_worn', sitting.sleeveWorn),
      ...(sitting.hoursSinceTraining === null ? [] : [mark('limb_assessment', assessmentId, 'hours_since_training', sitting.hoursSinceTraining)]),
      ...(readsTape && plan.marksTape ? asEntered.trials.flatMap(({ side, trial, circumferencesMm }) => circumferencesMm.flatMap((girthMm, level) => {
        const slipped = slip?.kind === 'trial' && slip.side === side && slip.trial === trial && slip.level === level;
        return girthMm === null || slipped ? [] : [mark('limb_trial', sitting.trialIds.get(`${side} ${trial}`) ?? '', `circumferences_mm.${level}`, girthMm)];
      })) : []),
    ];
    const marked = eventBy(plan.monitor, at, 'verification.mark', [inserted('verification', ...rows)]);
    const changedAt = plan.clock.at(office(addDays(on, wait)), 700, person.site.timeZone);
    if (!changes || sitting.hoursSinceTraining === null || !plan.clock.isPast(changedAt)) return [marked];
    const changed = updated('limb_assessment', { id: assessmentId, hours_since_training: Math.min(999, sitting.hoursSinceTraining + 24) });
    return [marked, eventBy(person.site.coordinator, changedAt, 'assessment.correct', [changed], 'The log shows the last session a day earlier.')];
  });
}
