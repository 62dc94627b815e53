import { defineEditCheck } from './define-edit-check';

const ITEMS_NEEDED = 5;
const SECONDS_PER_ITEM = 2;

export const answersAllSame = defineEditCheck<{ readonly answers: readonly number[] }>({
  id: 'answers.all-same',
  version: 1,
  severity: 'soft',
  uses: 'this-sitting',
  title: 'One answer to every question',
  source: 'common practice, no source',
  // All 'not at all' is the honest answer of a well arm, so only other values are asked about.
  run({ answers }) {
    const [first = 0] = answers;
    const isSame = answers.length >= ITEMS_NEEDED && first !== 0 && answers.every((answer) => answer === first);
    return isSame ? { message: `All ${answers.length} questions have the same answer. The answers stand; the site may ask about them.` } : null;
  },
  examplePass: { answers: [1, 1, 2, 1, 1] },
  exampleFires: { answers: [2, 2, 2, 2, 2] },
});

export const answersFast = defineEditCheck<{ readonly answered: number; readonly seconds: number }>({
  id: 'answers.fast',
  version: 1,
  severity: 'soft',
  uses: 'this-sitting',
  title: 'Under two seconds a question',
  source: 'common practice, no source',
  run: ({ answered, seconds }) =>
    answered > 0 && seconds < SECONDS_PER_ITEM * answered ? { message: `${answered} questions were answered in ${Math.round(seconds)} seconds. The answers stand, with this mark.`, value: seconds } : null,
  examplePass: { answered: 8, seconds: 40 },
  exampleFires: { answered: 8, seconds: 12 },
});
