import { reportedSigns } from '@/instruments/safety/symptom-report';
import { lowerFirst, upperFirst } from '@/instruments/words';
import { keptAnswers } from './answers';

/** What was said, in a line: 'Fuller, tighter; longer than a day'. */
export function reportWords(answers: unknown): string {
  const kept = keptAnswers.safeParse(answers);
  if (!kept.success) return 'A change in the arm';
  const { signs, lastedOverADay, soreness, armCheck } = kept.data;
  const said = signs.map((code) => lowerFirst(reportedSigns.find((sign) => sign.code === code)?.text ?? code)).join(', ');
  const lasting = lastedOverADay === null ? null : lastedOverADay ? 'longer than a day' : 'gone within a day';
  const sore = soreness === null ? null : `sore for ${soreness.days} ${soreness.days === 1 ? 'day' : 'days'}${soreness.onlyTrainedMuscles ? ', trained muscles only' : ''}`;
  const check = armCheck ? `arm check before training: ${armCheck}` : null;
  const line = [said || null, lasting, sore, check].filter((part) => part !== null).join('; ');
  return upperFirst(line);
}
