import { beginVisit, type Visit } from '@/entities/visit';
import { daysBetween, placeInWindow } from '@/instruments/calendar';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { studyDaysOf } from './study-days';

const countDays = (days: number): string => (days === 1 ? '1 day' : `${days} days`);

/** 'Month 24 opens on 2028-11-02, 700 days from today.' */
function outsideWords({ name, opensOn, closesOn }: Visit, today: string): string {
  return today < opensOn
    ? `${name} opens on ${opensOn}, ${countDays(daysBetween({ from: today, to: opensOn }))} from today.`
    : `${name} closed on ${closesOn}, ${countDays(daysBetween({ from: closesOn, to: today }))} ago.`;
}

/**
 * Begins a visit today, by the clock of the site. One that has begun goes on. Out of its window it is a deviation and
 * begins only with the reason, which stays with the visit.
 * @throws Refusal 'invalid' at 'windowReason' out of the window without one, 'conflict' before the enrolment or after the study.
 */
export async function startVisit(work: Work, visit: Visit, windowReason: string | undefined): Promise<void> {
  const { today, enrolledOn, lastOn } = await studyDaysOf(work, visit.participantId);
  if (visit.state === 'to come') {
    if (today < enrolledOn) throw new Refusal('conflict', `This participant is enrolled from ${enrolledOn}; no visit can begin before.`);
    if (today > lastOn) throw new Refusal('conflict', `This participant’s time in the study was over on ${lastOn}; no visit can begin after.`);
    const isOutside = placeInWindow(visit, today).status !== 'in';
    if (isOutside && !windowReason) throw new Refusal('invalid', `${outsideWords(visit, today)} Say why it takes place now, or leave it to come.`, 'windowReason');
    visit.windowReason = isOutside ? windowReason : null;
  }
  beginVisit(visit, today);
}
