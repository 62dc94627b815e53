import { addDays, type LocalDate } from '@/instruments/calendar';
import { participantCode } from '@/instruments/participant-code';
import { Draw } from './draw';
import type { Doer } from './events';
import { inventIdentity, type Identity } from './names';
import type { DemoSite, Plan } from './plan';
import type { Cast } from './story';

type Side = 'left' | 'right';

/** The fixed facts of an invented participant. */
export interface Facts {
  readonly cohort: 'at-risk' | 'swelling';
  readonly affectedSide: Side;
  readonly dominantSide: Side | 'both';
  readonly ageYears: number;
  readonly heightMm: number;
  readonly weightKg: number;
  readonly surgeryOn: LocalDate;
  readonly surgery: string;
  readonly axillaryProcedure: string;
  readonly nodesRemoved: number;
  readonly radiotherapy: string;
  readonly systemicTherapy: string;
}

export interface Person {
  /** Number over the whole study; decides the streams of this person. */
  readonly key: number;
  readonly site: DemoSite;
  readonly number: number;
  readonly code: string;
  readonly id: string;
  readonly screeningId: string;
  readonly account: Doer;
  readonly cast: Cast | null;
  readonly enrolledOn: LocalDate;
  readonly facts: Facts;
  readonly identity: Identity & { readonly bornOn: LocalDate };
  /** How willing: share of sessions done, of questionnaires answered, of visits kept. */
  readonly diligence: number;
  draw(purpose: Parameters<typeof Draw.of>[2]): Draw;
}

/** Persons of one site never share a stream with those of another. */
export const personKey = (site: DemoSite, number: number): number => 1000 + number * 4 + site.index;

export function inventPerson(plan: Plan, input: { site: DemoSite; number: number; enrolledOn: LocalDate; cast: Cast | null }): Person {
  const { site, number, enrolledOn, cast } = input;
  const key = personKey(site, number);
  const draw = (purpose: Parameters<typeof Draw.of>[2]): Draw => Draw.of(plan.seed, key, purpose);
  const ids = draw('ids');
  const facts = { ...inventFacts(draw('facts'), enrolledOn), ...cast?.facts?.(enrolledOn) };
  const code = participantCode(site.code, number);
  const identity = { ...inventIdentity(draw('names'), `${site.code}${number}`, site.timeZone), ...(cast?.signIn && { name: cast.signIn.name, email: cast.signIn.email }) };
  return {
    key, site, number, code, enrolledOn, cast, facts, draw,
    id: ids.uuid(),
    screeningId: ids.uuid(),
    account: { accountId: ids.uuid(), role: 'participant', label: code },
    identity: { ...identity, bornOn: addDays(enrolledOn, -Math.round((facts.ageYears + 0.5) * 365.25)) },
    diligence: cast ? 0.93 : draw('visits').between(0.45, 0.99, 0.84, 0.13),
  };
}

function inventFacts(draw: Draw, enrolledOn: LocalDate): Facts {
  const clearance = draw.chance(0.38);
  const nodal = draw.chance(clearance ? 0.6 : 0.2);
  const heightMm = Math.round(draw.between(1480, 1850, 1635, 64));
  const bmi = draw.between(18.5, 44, 27.2, 4.8);
  const dominantSide = draw.weighted<Side | 'both'>([['right', 88], ['left', 10], ['both', 2]]);
  return {
    cohort: draw.chance(0.88) ? 'at-risk' : 'swelling',
    affectedSide: draw.pick(['left', 'right'] as const),
    dominantSide,
    ageYears: Math.round(draw.between(29, 82, 56, 10)),
    heightMm,
    weightKg: bmi * (heightMm / 1000) ** 2,
    surgeryOn: addDays(enrolledOn, -draw.whole(60, 420)),
    surgery: draw.weighted([['breast-conserving', 58], ['mastectomy', 34], ['mastectomy-reconstruction', 8]]),
    axillaryProcedure: clearance ? 'axillary-dissection' : 'sentinel-node-biopsy',
    // Medians of 16 and 2 nodes are typical (clinical studies of the two procedures).
    nodesRemoved: clearance ? Math.round(draw.between(8, 34, 16, 4.5)) : draw.whole(1, 4),
    radiotherapy: nodal ? 'regional-nodes' : draw.chance(0.72) ? 'breast-or-chest-wall' : 'none',
    systemicTherapy: draw.weighted([['endocrine', 40], ['chemotherapy-taxane', 34], ['chemotherapy-other', 6], ['targeted', 6], ['none', 14]]),
  };
}

/** Whether the dominant arm is the one at risk; null where neither dominates. */
export const atRiskIsDominant = ({ affectedSide, dominantSide }: Facts): boolean | null =>
  dominantSide === 'both' ? null : dominantSide === affectedSide;
