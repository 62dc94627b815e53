import { printKg } from '../numbers';
import type { LoadFacts, TrainingRuleCode } from './define-training-rule';
import { allowedLoad } from './allowed-load';
import type { TrainingFlag } from './judge-sessions';
import { defaultTrainingSettings, type TrainingSettings } from './settings';

/** What the participant reads about a flag. It advises and never blocks the log: an untrue log would be worse. */
export interface TrainingAdvice {
  /** States the fact. */
  readonly title: string;
  /** States the rule and why it is there. */
  readonly text: string;
  /** The load the first button offers; null when no load is at issue. */
  readonly safeLoadKg: number | null;
  /** First button, 'Change to 8 kg'; null when there is nothing to change. */
  readonly changeLabel: string | null;
  /** Second button, which keeps the log true. */
  readonly keepLabel: string;
  /** Said under the buttons. */
  readonly note: string;
  /** Ask the person to be in touch with the site before the next session. */
  readonly contactSite: boolean;
}

/** Stands wherever a load or advice is shown. */
export const TRAINING_CAUTION = 'This log does not replace your clinician’s advice.';
const TRUE_LOG = 'If you have lifted it, say so: the log should be true. Your site will see it.';
const SITE_SEES = 'Your site will see this.';

interface Wording {
  readonly title: string;
  readonly text: string;
  readonly contactSite?: boolean;
}

/** Plain words for a flag; the safe load comes from the same rules the stepper uses. */
export function adviceFor(flag: TrainingFlag, settings: TrainingSettings = defaultTrainingSettings): TrainingAdvice {
  const { facts } = flag;
  const { title, text, contactSite = false } = facts ? loadWords(flag.rule, facts, settings) : sessionWords(flag.rule);
  if (facts === null || facts.isBand || isInformation(flag.rule)) {
    return { title, text, safeLoadKg: null, changeLabel: null, keepLabel: 'Save and go on', note: SITE_SEES, contactSite };
  }
  const safeLoadKg = allowedLoad(facts.past, facts.on, facts.arm, settings).upToKg;
  return {
    title,
    text,
    safeLoadKg,
    changeLabel: `Change to ${printKg(safeLoadKg)} kg`,
    keepLabel: `I have already lifted ${printKg(facts.load)} kg`,
    note: TRUE_LOG,
    contactSite,
  };
}

const URGENCY: readonly TrainingRuleCode[] = [
  'ASSESSMENT_REQUIRED',
  'TRAINED_BEFORE_ASSESSMENT',
  'STEP_HARD',
  'RAISE_WITHOUT_CLEAR_ARM',
  'RESUME_HIGH',
  'STEP_OVER',
  'START_HIGH',
  'RAISED_WITHIN_WEEK',
  'RAISE_ARM_UNKNOWN',
  'HOLD_OR_REDUCE',
  'RAISED_EARLY',
  'RAISED_SOON',
  'BASELINE_MISSING',
  'RESUME_LOW',
];

/** The flags of a session in the order a person should read them, the gravest first. */
export function byUrgency(flags: readonly TrainingFlag[]): TrainingFlag[] {
  return flags.toSorted((a, b) => URGENCY.indexOf(a.rule) - URGENCY.indexOf(b.rule));
}

function isInformation(rule: TrainingRuleCode): boolean {
  return rule === 'RESUME_LOW';
}

function sessionWords(rule: TrainingRuleCode): Wording {
  switch (rule) {
    case 'ASSESSMENT_REQUIRED':
      return {
        title: 'Your arm has changed',
        text: 'Please hold your training until your site has seen your arm. Hot, red, suddenly swollen, or fever? Do not wait for a call: get urgent care now.',
        contactSite: true,
      };
    case 'TRAINED_BEFORE_ASSESSMENT':
      return { title: 'Your arm has not been measured yet', text: 'You told us that your arm had changed. Please hold your training until your site has seen it.', contactSite: true };
    case 'BASELINE_MISSING':
      return { title: 'Your arms have not been measured yet', text: 'The study needs both arms measured before training begins. Your site will arrange it.', contactSite: true };
    default:
      throw new RangeError(`${rule} is about a load and needs its history.`);
  }
}

function loadWords(rule: TrainingRuleCode, facts: LoadFacts, settings: TrainingSettings): Wording {
  const unit = facts.isBand ? 'band level' : 'kg';
  const lastWeek = facts.lastWeekMax ?? facts.previous?.load ?? 0;
  const over = (load: number): string => `${printKg(facts.load - load)} ${unit}`;
  switch (rule) {
    case 'START_HIGH':
      return { title: `${printKg(facts.load)} kg is a high start`, text: `The study’s rule is to start each exercise at ${printKg(settings.startKg)} kg or less. Starting light gives you time to notice a change.` };
    case 'STEP_OVER':
      return facts.isBand
        ? { title: `That is ${over(lastWeek)}s more than last week`, text: 'The study’s rule is at most one band level more from one week to the next, and only if the arm is unchanged.' }
        : { title: `That is ${over(lastWeek)} more than last week`, text: stepRule(settings) };
    case 'STEP_HARD':
      return {
        title: `That is ${over(facts.previous?.load ?? 0)} more than last time`,
        text: `The study’s rule is never ${printKg(settings.jumpKg)} kg or more at once. If you have lifted it, look at your arm over the next days and contact your site before your next session.`,
        contactSite: true,
      };
    case 'RAISED_WITHIN_WEEK':
      return { title: `That is ${over(facts.firstLoadThisWeek ?? 0)} more than earlier this week`, text: 'The study’s rule is to hold the load within a week and go up only from one week to the next.' };
    case 'RAISE_WITHOUT_CLEAR_ARM':
      return { title: 'Your arm has changed: do not go up', text: `The load may rise only if the arm is unchanged. ${HOLD_SENTENCE}`, contactSite: true };
    case 'RAISE_ARM_UNKNOWN':
      return { title: 'Answer the arm check before you go up', text: `The load may rise only if the arm is unchanged. Until you have answered, stay at ${printKg(lastWeek)} ${unit} or lighter.` };
    case 'RESUME_HIGH':
      return { title: `${printKg(facts.load)} kg is high after ${weeksOff(facts)} off`, text: resumeRule(facts, settings) };
    case 'RESUME_LOW':
      return { title: 'A light start after time off', text: 'That is fine. You may go up again week by week.' };
    case 'HOLD_OR_REDUCE':
      return { title: `You had ${facts.gapDays} days off this`, text: 'After some time off, hold the load or go lighter the first time back.' };
    case 'RAISED_SOON':
      return { title: 'You went up only days ago', text: `The study asks for ${settings.minDaysSinceRaise} days or more between one rise and the next.` };
    case 'RAISED_EARLY':
      return { title: 'Hold this load a little longer', text: `The study asks for ${settings.minSessionsAtLoad} sessions at a load before it rises.` };
    default:
      throw new RangeError(`${rule} is about a whole session and has no load.`);
  }
}

const HOLD_SENTENCE = 'Please hold your training until your site has seen your arm.';

function stepRule({ weeklyStepKg }: TrainingSettings): string {
  return `The study’s rule is at most ${printKg(weeklyStepKg)} kg more from one week to the next, and only if the arm is unchanged. Smaller steps give you time to notice a change.`;
}

function resumeRule(facts: LoadFacts, { resumeFromFraction, resumeToFraction, breakDays }: TrainingSettings): string {
  const lower = (fraction: number): string => String(Math.round((1 - fraction) * 100));
  return `After ${Math.round(breakDays / 7)} weeks or more off, start again ${lower(resumeToFraction)} to ${lower(resumeFromFraction)} % lower than the ${printKg(facts.previous?.load ?? 0)} kg you lifted before.`;
}

function weeksOff({ gapDays }: LoadFacts): string {
  return `${Math.floor((gapDays ?? 0) / 7)} weeks`;
}
