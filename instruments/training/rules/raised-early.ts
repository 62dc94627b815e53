import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { sessionsAtLoad, weeklyRise } from '../load-facts';
import { LOAD_EPSILON_KG } from '../settings';

/** Raised after fewer sessions at the load than the protocol asks; off unless set. Two clean sessions: Schmitz 2010, JAMA 304:2699, by a summary. */
export const raisedEarly = defineTrainingRule({
  code: 'RAISED_EARLY',
  title: 'Raised after too few sessions',
  severity: 'advice',
  scope: 'load',
  applies: (facts, { minSessionsAtLoad, breakDays }) => {
    if (minSessionsAtLoad === null || facts.lastWeekMax === null || (weeklyRise(facts) ?? 0) <= LOAD_EPSILON_KG) return false;
    return sessionsAtLoad(facts.past, { load: facts.lastWeekMax, on: facts.on, withinDays: breakDays }) < minSessionsAtLoad;
  },
  examples: {
    passes: exampleLoad({ '2024-01-08': 2, '2024-01-11': 2, '2024-01-15': 3 }),
    fires: exampleLoad({ '2024-01-08': 2, '2024-01-15': 3 }),
  },
});
