import { addDays, type LocalDate } from '@/instruments/calendar';
import type { ReportedSign } from '@/instruments/safety/symptom-report';
import { demoAccounts } from '../demo-accounts.mjs';
import { courseThrough, type Course } from './course';
import type { Facts } from './person';
import type { DemoSite } from './plan';

/** A part that one participant of the demonstration plays, so that the pictures and the sign-ins find what they need. */
export interface Cast {
  readonly part: 'middle of the programme' | 'before month 3' | 'urgent report' | 'report unread' | 'report read' | 'baseline booked';
  /** Days since enrolment, today. */
  readonly daysIn?: number;
  readonly signIn?: { readonly name: string; readonly email: string; readonly password: string };
  readonly facts?: (enrolledOn: LocalDate) => Partial<Facts>;
  readonly course?: Course;
  /** Weeks since the first session without training: first week, number of weeks. */
  readonly breaks?: readonly (readonly [week: number, weeks: number])[];
  /** A load taken too fast: week, kilograms above the week before. */
  readonly jump?: { readonly week: number; readonly extraKg: number };
  /** Days of scripted reports of heaviness that ended in an unscheduled visit. */
  readonly reports?: readonly { readonly day: number; readonly signs: readonly ReportedSign[]; readonly extraVisitDay: number }[];
}

const signInOf = (key: string): NonNullable<Cast['signIn']> => {
  const account = demoAccounts.find((candidate) => candidate.key === key);
  if (!account) throw new Error(`scripts/demo-accounts.mjs has no account ${key}.`);
  return { name: account.name, email: account.email, password: account.password };
};

/** Nine months in: two breaks, one jump, a change that rose and fell below the line. */
const middle = (): Cast => ({
  part: 'middle of the programme',
  daysIn: 268,
  signIn: signInOf('participant-one'),
  facts: (enrolledOn) => ({
    cohort: 'at-risk', affectedSide: 'left', dominantSide: 'right', ageYears: 54, heightMm: 1612, weightKg: 66.4, surgeryOn: addDays(enrolledOn, -49),
    surgery: 'mastectomy', axillaryProcedure: 'axillary-dissection', nodesRemoved: 14, radiotherapy: 'regional-nodes', systemicTherapy: 'endocrine',
  }),
  course: courseThrough([[0, 0], [94, 0.014], [177, 0.04], [226, 0.073], [268, 0.05]]),
  breaks: [[9, 3], [27, 5]],
  jump: { week: 19, extraKg: 3 },
  reports: [{ day: 222, signs: ['heavy', 'full'], extraVisitDay: 226 }],
});

/** Who plays which part at the first site, by number. Small studies leave parts out. */
export function castOf(site: DemoSite): Map<number, Cast> {
  if (site.code !== 'NM' || site.participants < 8) return new Map();
  const count = site.participants;
  const at = (share: number): number => Math.max(1, Math.round(count * share));
  const hero = count >= 50 ? 42 : at(0.72);
  return new Map<number, Cast>([
    [at(0.4), { part: 'report read' }],
    [at(0.52), { part: 'report unread' }],
    [hero - 2, { part: 'urgent report' }],
    [hero, middle()],
    [at(0.87), { part: 'before month 3', daysIn: 86, signIn: signInOf('participant-two') }],
    [count, { part: 'baseline booked', daysIn: 4 }],
  ]);
}

/** Days before today on which the participants of a site were enrolled, by number from 1; the cast keeps its days. */
export function enrolmentAges(count: number, cast: ReadonlyMap<number, Cast>, jitter: (number: number) => number): number[] {
  const fixed = [...cast].flatMap(([number, { daysIn }]) => (daysIn === undefined ? [] : [[number, daysIn] as const])).toSorted(([a], [b]) => a - b);
  const posts = [[0, 752] as const, ...fixed, ...(fixed.at(-1)?.[0] === count ? [] : [[count + 1, 2] as const])];
  return Array.from({ length: count }, (_, index) => {
    const number = index + 1;
    const own = cast.get(number)?.daysIn;
    if (own !== undefined) return own;
    const after = posts.findIndex(([post]) => post > number);
    const [toNumber, to] = posts[after] ?? [count + 1, 2];
    const [fromNumber, from] = posts[after - 1] ?? [0, 752];
    const stepDays = (to - from) / (toNumber - fromNumber);
    return Math.round(from + stepDays * (number - fromNumber + jitter(number)));
  });
}
