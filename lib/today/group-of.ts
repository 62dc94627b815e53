import { daysBetween } from '@/instruments/calendar';
import type { WorkGroupKey } from './work-item';

/** The group of a due day: before today, today, one to seven days ahead, later. */
export function groupOf({ dueOn, today }: { dueOn: string; today: string }): WorkGroupKey {
  const ahead = daysBetween({ from: today, to: dueOn });
  if (ahead < 0) return 'late';
  if (ahead === 0) return 'today';
  return ahead <= 7 ? 'week' : 'later';
}
