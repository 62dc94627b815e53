import { addDays, type LocalDate } from '@/instruments/calendar';
import { contentHash } from '@/lib/consent/consent-content';
import { notEnrolledReasons } from '@/lib/enrolment/input';
import { consentForm } from './consent-form';
import { minutesAfter } from './clock';
import { Draw } from './draw';
import { type Change, type DemoEvent, eventBy, inserted, type Row, updated } from './events';
import { inventIdentity } from './names';
import { type Person } from './person';
import { type DemoSite, invitee, type Plan } from './plan';

const referrers = ['Breast clinic', 'Breast clinic', 'Physiotherapist', 'Oncology nurse', 'Leaflet', 'A friend in the study'];
const sectionKeys = consentForm.sections.map(({ key }) => key);

interface Candidate {
  readonly plan: Plan;
  readonly site: DemoSite;
  readonly draw: Draw;
  readonly screeningId: string;
  readonly number: number;
  readonly on: LocalDate;
  readonly cohort: string;
  readonly identity: { readonly name: string; readonly email: string; readonly phone: string; readonly bornOn: LocalDate };
}

const moment = ({ plan, site }: Candidate, days: number, minutes: number, on: LocalDate): Date => plan.clock.at(addDays(on, days), minutes, site.timeZone);

function opened(candidate: Candidate): DemoEvent {
  const { plan, site, draw, screeningId, number, on, cohort, identity } = candidate;
  const at = moment(candidate, 0, draw.whole(545, 600), on);
  return eventBy(site.coordinator, at, 'screening.open', [
    inserted('screening', { id: screeningId, site_id: site.id, number, screened_on: on, cohort, referred_by: draw.pick(referrers), state: 'screening', protocol_version_id: plan.ids.protocol, created_at: at.toISOString() }),
    inserted('participant_identity', { id: draw.uuid(), screening_id: screeningId, site_id: site.id, name: identity.name, email: identity.email, phone: identity.phone, born_on: identity.bornOn }),
  ]);
}

/** Answers to the criteria; those named in `fails` go against the person, and the list ends at `upTo`. */
function answersOf({ plan, site, draw, screeningId }: Candidate, fails: readonly string[] = [], upTo = Infinity): Row[] {
  return plan.protocol.eligibility.slice(0, upTo).map(({ key, lets }) => ({
    id: draw.uuid(), screening_id: screeningId, site_id: site.id, criterion: key, answer: fails.includes(key) ? (lets === 'yes' ? 'no' : 'yes') : lets,
  }));
}

interface ConsentIds { readonly consentId: string; readonly participantSignature: string; readonly staffSignature: string }

function permissionsOf(draw: Draw): Record<string, 'yes' | 'no'> {
  const share: Record<string, number> = { 'future-contact': 0.8, 'data-sharing': 0.88, linkage: 0.66 };
  return Object.fromEntries(consentForm.permissions.map(({ key }) => [key, draw.chance(share[key] ?? 0.8) ? 'yes' as const : 'no' as const]));
}

/** Reading, the participant's signature, the second signature; as many steps as asked for. */
function consentEvents(candidate: Candidate, { consentId, participantSignature, staffSignature }: ConsentIds, at: Date, steps: 'reading' | 'signed' | 'complete'): DemoEvent[] {
  const { plan, site, draw, screeningId, identity } = candidate;
  const mode = draw.chance(0.72) ? 'tablet' : 'home';
  const permissions = permissionsOf(draw);
  const signedAt = minutesAfter(at, draw.whole(11, 30));
  const counteredAt = minutesAfter(signedAt, mode === 'home' ? draw.whole(40, 150) : 3);
  const signature = (id: string, who: 'participant' | 'staff', name: string, when: Date): Row => ({
    id, consent_id: consentId, screening_id: screeningId, site_id: site.id, who, means: 'typed', name, signed_at: when.toISOString(), content_sha256: contentHash({ formNumber: '1.0', form: consentForm, permissions }),
  });
  const start = { id: consentId, screening_id: screeningId, site_id: site.id, form_version_id: plan.ids.consentForm, mode, state: 'reading', created_at: at.toISOString() };
  const events = [eventBy(site.coordinator, at, 'consent.start', [inserted('consent', start)])];
  if (steps === 'reading') return [...events, eventBy(invitee, minutesAfter(at, 4), 'consent.read-part', [updated('consent', { id: consentId, sections_read: sectionKeys.slice(0, 3) })])];
  events.push(
    eventBy(invitee, minutesAfter(signedAt, -1), 'consent.read-part', [updated('consent', { id: consentId, sections_read: sectionKeys, permissions })]),
    eventBy(invitee, signedAt, 'consent.sign', [
      updated('consent', { id: consentId, state: 'signed by participant', participant_signed_at: signedAt.toISOString() }),
      inserted('consent_signature', signature(participantSignature, 'participant', identity.name, signedAt)),
    ]),
  );
  if (steps === 'signed') return events;
  return [...events, eventBy(site.coordinator, counteredAt, 'consent.countersign', [
    updated('consent', { id: consentId, state: 'complete', staff_signed_at: counteredAt.toISOString(), staff_signed_by: site.coordinator.accountId }),
    inserted('consent_signature', { ...signature(staffSignature, 'staff', site.coordinator.name, counteredAt), account_id: site.coordinator.accountId }),
  ])];
}

/** Screening, eligibility, consent: everything before enrolment, which happens at `enrolledAt` and carries `enrolment`. */
export function enrolledScreening(plan: Plan, person: Person, number: number, enrolledAt: Date, enrolment: readonly Change[]): DemoEvent[] {
  const draw = person.draw('screening');
  const { site, screeningId, id } = person;
  const candidate: Candidate = { plan, site, draw, screeningId, number, on: addDays(person.enrolledOn, -draw.whole(6, 20)), cohort: person.facts.cohort, identity: person.identity };
  const open = opened(candidate);
  const answers = answersOf(candidate);
  const confirmedAt = moment(candidate, 2, draw.whole(600, 960), candidate.on);
  const ids = { consentId: draw.uuid(), participantSignature: draw.uuid(), staffSignature: draw.uuid() };
  const consent = consentEvents(candidate, ids, plan.clock.at(addDays(person.enrolledOn, -1), draw.whole(790, 900), site.timeZone), 'complete');
  const identityId = String(open.changes[1]?.rows[0]?.['id']);
  const joined = (row: string): Row => ({ id: row, participant_id: id });
  return [
    open,
    eventBy(site.coordinator, minutesAfter(open.at, 9), 'screening.answer', [inserted('eligibility_answer', ...answers)]),
    eventBy(site.investigator, confirmedAt, 'screening.confirm', [updated('screening', { id: screeningId, eligibility_confirmed_at: confirmedAt.toISOString(), eligibility_confirmed_by: site.investigator.accountId })]),
    ...consent,
    eventBy(site.coordinator, enrolledAt, 'participant.enrol', [
      ...enrolment,
      updated('screening', { id: screeningId, state: 'enrolled', participant_id: id }),
      updated('eligibility_answer', ...answers.map((answer) => joined(String(answer['id'])))),
      updated('consent', joined(ids.consentId)),
      updated('participant_identity', joined(identityId)),
    ]),
  ];
}

const reasons = [
  ['Not eligible', 36, 'nodes'], ['Advised against by the clinician', 8, 'advised-against'], ['Declined: no time', 22, null], ['Declined: worried about lifting', 12, null],
  ['Declined: no interest', 8, null], ['Could not be reached', 8, null], ['Declined: distance or travel', 6, null],
] as const satisfies readonly (readonly [(typeof notEnrolledReasons)[number], number, string | null])[];

/** People who were screened and not enrolled, or not yet. The last three of a site are still on their way. */
export function otherScreening(plan: Plan, site: DemoSite, nth: number, number: number, on: LocalDate): DemoEvent[] {
  const draw = Draw.of(plan.seed, 500 + nth * 4 + site.index + 1_000_000, 'screening');
  const identity = { ...inventIdentity(draw, `${site.code}s${number}`, site.timeZone), bornOn: addDays(on, -draw.whole(11_000, 29_000)) };
  const candidate: Candidate = { plan, site, draw, screeningId: draw.uuid(), number, on, cohort: draw.chance(0.88) ? 'at-risk' : 'swelling', identity };
  const open = opened(candidate);
  const left = site.others - nth;
  const events = left >= 3 ? turnedAway(candidate, open) : onTheWay(candidate, open, left);
  return events.filter(({ at }) => plan.clock.isPast(at));
}

function turnedAway(candidate: Candidate, open: DemoEvent): DemoEvent[] {
  const { site, draw, screeningId, on } = candidate;
  const [reason, , fails] = draw.weighted(reasons.map((entry) => [entry, entry[1]] as const));
  const at = moment(candidate, fails ? 0 : draw.whole(1, 14), fails ? 640 : draw.whole(560, 980), on);
  const answers = answersOf(candidate, fails ? [fails] : [], fails ? Infinity : draw.whole(3, 8));
  return [
    open,
    eventBy(site.coordinator, minutesAfter(open.at, 9), 'screening.answer', [inserted('eligibility_answer', ...answers)]),
    eventBy(site.coordinator, at, 'screening.leave', [updated('screening', { id: screeningId, state: 'not enrolled', not_enrolled_reason: reason, not_enrolled_note: null })]),
  ];
}

function onTheWay(candidate: Candidate, open: DemoEvent, left: number): DemoEvent[] {
  const { plan, site, draw, screeningId } = candidate;
  const answered = eventBy(site.coordinator, minutesAfter(open.at, 9), 'screening.answer', [inserted('eligibility_answer', ...answersOf(candidate, [], left === 0 ? 4 : Infinity))]);
  if (left === 0) return [open, answered];
  const confirmedAt = minutesAfter(open.at, 60 * draw.whole(20, 28));
  const confirmed = eventBy(site.investigator, confirmedAt, 'screening.confirm', [
    updated('screening', { id: screeningId, eligibility_confirmed_at: confirmedAt.toISOString(), eligibility_confirmed_by: site.investigator.accountId }),
  ]);
  const ids = { consentId: draw.uuid(), participantSignature: draw.uuid(), staffSignature: draw.uuid() };
  const startedAt = minutesAfter(plan.clock.now, -60 * draw.whole(16, 22));
  return [open, answered, confirmed, ...consentEvents(candidate, ids, startedAt, left === 1 ? 'signed' : 'reading')];
}
