/** The arm check asked before any load, in order. `changed` is what the rules take from the answer. */
export const armCheckAnswers = [
  { value: 'same', text: 'The same', changed: false },
  { value: 'a-little', text: 'A little fuller, heavier or tighter', changed: true },
  { value: 'clearly', text: 'Clearly fuller or swollen', changed: true },
  { value: 'not-sure', text: 'I am not sure', changed: null },
] as const;

export type ArmCheckAnswer = (typeof armCheckAnswers)[number]['value'];

/** 'Not sure' and no answer are both unknown: the load may stay, not rise. */
export function armChangedBy(answer: ArmCheckAnswer | null): boolean | null {
  return armCheckAnswers.find(({ value }) => value === answer)?.changed ?? null;
}

/** The question, with the arm named. */
export function armCheckQuestion(arm: 'left' | 'right' | 'both'): string {
  return arm === 'both' ? 'Since your last session, your arms are' : `Since your last session, your ${arm} arm is`;
}
