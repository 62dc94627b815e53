import type { ArmCheckAnswer } from '@/instruments/training/arm-check';

/** The arm check as the record keeps it, beside the code that the rules know. */
const codes = { 'the same': 'same', 'a little fuller': 'a-little', 'clearly fuller': 'clearly', 'not sure': 'not-sure' } as const satisfies Record<string, ArmCheckAnswer>;

export type ArmCheckWords = keyof typeof codes;

export const isArmCheckWords = (text: string): text is ArmCheckWords => text in codes;
export const armCheckCode = (words: ArmCheckWords): ArmCheckAnswer => codes[words];
