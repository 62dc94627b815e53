import type { ArmCheckAnswer } from '../training/arm-check';
import { type SafetyVerdict, safetyVerdict } from './judge-symptom-report';

/**
 * What an arm check alone asks for: a change holds training and starts the site's clock; clearly swollen is measured
 * within 3 days. 'Not sure' neither holds nor raises; null there and for 'the same'.
 */
export function judgeArmCheck(answer: ArmCheckAnswer | null): SafetyVerdict | null {
  if (answer === 'clearly') return { ...safetyVerdict('S1'), measureWithin: { days: 3 } };
  return answer === 'a-little' ? safetyVerdict('S1') : null;
}
