import { defineQuestionnaire } from './define-questionnaire';
import { howMuch, notTried, onePerPage, worded } from './items';

const choices = [...howMuch, notTried];
const ask = (name: string, task: string) => worded(name, `In the past week, how much did your arm get in the way of ${task}?`, choices);

const tasks = ['shelf', 'bag', 'jar', 'buttons', 'housework', 'dressing', 'hair', 'work', 'sleep-side', 'sport'] as const;

export const dailyTasks = defineQuestionnaire({
  key: 'daily-tasks',
  version: 1,
  title: 'Daily life',
  construct: 'What the arm lets one do: reach, carry, fine hand work, home, work and sport',
  recall: 'the past week',
  minutes: 4,
  survey: onePerPage('Daily life', [
    ask('shelf', 'reaching a high shelf'),
    ask('bag', 'carrying a full shopping bag'),
    ask('jar', 'opening a new jar'),
    ask('buttons', 'small tasks such as buttons or writing'),
    ask('housework', 'cleaning floors or windows'),
    ask('dressing', 'pulling a top over your head'),
    ask('hair', 'washing or drying your hair'),
    ask('work', 'your work, paid or at home'),
    ask('sleep-side', 'lying on that side in bed'),
    ask('sport', 'sport, dance or play'),
  ]),
  scales: [
    { code: 'function', name: 'Arm function', items: tasks, min: 0, max: 3, direction: 'turned', highMeans: 'better function', missingRule: { atLeast: 'half' } },
  ],
  alerts: [],
});
