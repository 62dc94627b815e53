import { z } from 'zod';

/** Years that a birth, a treatment or an appointment can lie in; what is outside was mistyped. */
const [first, last] = [1900, 2100];

/**
 * A day written 'YYYY-MM-DD' in a year that can be meant.
 * @param sentence what to give, when it is not a day.
 */
export const calendarDay = (sentence: string) =>
  // What is no day at all has its sentence already.
  z.iso.date(sentence).refine((day) => !/^\d{4}-/.test(day) || (Number(day.slice(0, 4)) >= first && Number(day.slice(0, 4)) <= last), { error: `The year must lie between ${first} and ${last}.` });
