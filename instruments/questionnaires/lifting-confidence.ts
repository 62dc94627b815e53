import { defineQuestionnaire } from './define-questionnaire';
import { howMuch, onePerPage, worded } from './items';

const howSure = [
  { value: 0, text: { default: 'Not sure at all' } },
  { value: 1, text: { default: 'A little sure' } },
  { value: 2, text: { default: 'Quite sure' } },
  { value: 3, text: { default: 'Very sure' } },
];
const sure = (name: string, deed: string) => worded(name, `Today, how sure are you that you can ${deed}?`, howSure);
const worry = (name: string, matter: string) => worded(name, `In the past week, how much did you worry ${matter}?`, howMuch);

export const liftingConfidence = defineQuestionnaire({
  key: 'lifting-confidence',
  version: 1,
  title: 'Lifting: trust and worry',
  construct: 'Confidence to lift and to judge the arm; worry that lifting may harm it',
  recall: 'confidence today, worry in the past week',
  minutes: 3,
  survey: onePerPage('Lifting: trust and worry', [
    sure('lift-home', 'lift what you need to at home'),
    sure('train-alone', 'do your training with nobody there'),
    sure('notice', 'notice a change in your arm early'),
    sure('next-step', 'tell when it is time to lift more, or less'),
    worry('worry-swell', 'that lifting would make your arm swell'),
    worry('worry-report', 'that telling us of a change would end your training'),
    worry('worry-use', 'about using that arm in daily life'),
    worded('avoid', 'In the past week, how much did you hold back from lifting out of worry?', howMuch),
  ]),
  scales: [
    { code: 'confidence', name: 'Confidence to lift', items: ['lift-home', 'train-alone', 'notice', 'next-step'], min: 0, max: 3, direction: 'as items', highMeans: 'more confidence', missingRule: { moreThan: 'half' } },
    { code: 'worry', name: 'Worry about lifting', items: ['worry-swell', 'worry-report', 'worry-use', 'avoid'], min: 0, max: 3, direction: 'as items', highMeans: 'more worry', missingRule: { moreThan: 'half' } },
  ],
  alerts: [],
});
