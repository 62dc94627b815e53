import { defineQuestionnaire } from './define-questionnaire';
import { howMuch, onePerPage, worded } from './items';

const symptoms = ['swelling', 'heaviness', 'tightness', 'ache', 'numbness', 'stiffness', 'warmth', 'tiredness'] as const;
const anySymptom = symptoms.map((name) => `{${name}} > 0`).join(' or ');

export const armSymptoms = defineQuestionnaire({
  key: 'arm-symptoms',
  version: 1,
  title: 'How your arm feels',
  construct: 'Symptoms of the at-risk arm: how strong each is, and how much they bother',
  recall: 'the past week',
  minutes: 3,
  survey: onePerPage('How your arm feels', [
    worded('swelling', 'In the past week, how swollen did your arm or hand look or feel?', howMuch),
    worded('heaviness', 'In the past week, how heavy did your arm feel?', howMuch),
    worded('tightness', 'In the past week, how tight or hard did the skin of your arm feel?', howMuch),
    worded('ache', 'In the past week, how much did your arm ache or hurt?', howMuch),
    worded('numbness', 'In the past week, how much did you feel numb or have pins and needles in your arm?', howMuch),
    worded('stiffness', 'In the past week, how stiff was your arm or shoulder?', howMuch),
    worded('warmth', 'In the past week, how hot or red was the skin of your arm?', howMuch),
    worded('tiredness', 'In the past week, how soon did your arm get tired?', [
      { value: 0, text: { default: 'No sooner than the other arm' } },
      { value: 1, text: { default: 'A little sooner' } },
      { value: 2, text: { default: 'Quite a bit sooner' } },
      { value: 3, text: { default: 'Much sooner' } },
    ]),
    worded('bother', 'In the past week, how much did all this bother you?', howMuch, anySymptom),
  ]),
  scales: [
    { code: 'symptoms', name: 'Arm symptoms', items: symptoms, min: 0, max: 3, direction: 'as items', highMeans: 'more symptoms', missingRule: { atLeast: 'half' } },
  ],
  alerts: [
    { item: 'warmth', atLeast: 1, level: 'R1' },
    { item: 'swelling', atLeast: 2, level: 'S1' },
  ],
});
