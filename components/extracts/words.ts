import type { ExtractPreview } from '@/lib/extracts/preview-extract';
import type { ExtractView } from '@/lib/extracts/view-extract';
import type { GaugeState } from '../ui/gauge';

type Variable = ExtractPreview['groups'][number]['rows'][number];

export const profileWords: Record<ExtractView['profile'], string> = { open: 'open', controlled: 'controlled' };

/** What the class of a variable says about a person. */
export const classWords: Record<Variable['class'], string> = { direct: 'directly', quasi: 'with others', sensitive: 'no, but sensitive', none: 'no', 'free text': 'may, in words' };

export const treatmentWords: Record<Variable['treatment'], string> = {
  'as is': 'As is',
  'left out': 'Left out',
  'random number': 'New random number',
  'numbered at random': 'Numbered at random',
  'study day': 'Days from enrolment',
  'wide bands': 'Wide bands',
  'narrow bands': 'Narrow bands',
  'listed answers only': 'Offered answers only',
  'verdict only': 'Verdict only',
  'yes or no only': 'Yes or no only',
};

/** Where an extract stands, as a word and a level. */
export function standing({ state, progress }: Pick<ExtractView, 'state' | 'progress'>): { state: GaugeState; word: string; level?: number } {
  if (state === 'ready') return { state: 'done', word: 'Ready' };
  if (state === 'failed') return { state: 'needs', word: 'Failed', level: 1 };
  if (state === 'preparing') return { state: 'part', word: `Preparing, ${progress} %`, level: progress / 100 };
  return { state: 'waiting', word: 'Waiting for its turn', level: 0.3 };
}

/** '36d0 1db5 … c48b': enough to compare by eye. */
export const shortSum = (sha256: string): string => `${sha256.slice(0, 4)} ${sha256.slice(4, 8)} … ${sha256.slice(-4)}`;
