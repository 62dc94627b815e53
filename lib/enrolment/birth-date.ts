import { plainDate } from '@/lib/people/plain-date';
import { Refusal } from '@/lib/work/refusal';

/** Whole years from a birth date to a day, both 'YYYY-MM-DD'; a birthday on 29 February is reached on 1 March of other years. */
export function ageYears(bornOn: string, on: string): number {
  const years = Number(on.slice(0, 4)) - Number(bornOn.slice(0, 4));
  return on.slice(5) < bornOn.slice(5) ? years - 1 : years;
}

/** @throws Refusal 'invalid' for a date of birth to come, or an age no participant has. */
export function checkBirthDate(bornOn: string, today: string): void {
  if (bornOn > today) throw new Refusal('invalid', `${plainDate(bornOn)} is still to come. Check the year of birth.`, 'bornOn');
  const age = ageYears(bornOn, today);
  if (age > 110) throw new Refusal('invalid', `${plainDate(bornOn)} would make ${age} years. Check the year of birth.`, 'bornOn');
}
