import { daysBetween } from '@/instruments/calendar';
import { participantCode } from '@/instruments/participant-code';
import { ConsentSchema } from '@/entities/consent';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { ParticipantSchema, type Participant } from '@/entities/participant';
import { assertEnrollable, endInEnrolment, type Screening } from '@/entities/screening';
import { participantInvite } from '@/lib/jobs/handlers/participant-invite';
import { plainDate } from '@/lib/people/plain-date';
import { findProtocol, type Protocol } from '@/lib/protocol/find-protocol';
import { layOutSchedule } from '@/lib/schedule/lay-out-schedule';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { ageYears } from './birth-date';
import { findScreening } from './find-screening';
import type { EnrolInput } from './input';

/** Somebody who was just enrolled. */
export interface EnrolledView {
  readonly participantId: string;
  readonly code: string;
  readonly visitCount: number;
}

/** What the identity says about the age, and that a letter can be sent. */
async function ageFrom(work: Work, screeningId: string, enrolledOn: string): Promise<number> {
  const identity = await work.em.findOne(ParticipantIdentitySchema, { screeningId });
  if (!identity?.bornOn) throw new Refusal('invalid', 'The date of birth is missing. Add it to the contact details first.', 'bornOn');
  if (!identity.email) throw new Refusal('invalid', 'There is no e-mail address for the invitation. Add it to the contact details first.', 'email');
  const age = ageYears(identity.bornOn, enrolledOn);
  if (age < 18) throw new Refusal('invalid', `The date of birth makes ${age} years. Participants are 18 or older.`, 'bornOn');
  return age;
}

/** The day that visits are counted from. Until the first session is known, enrolment stands in for it. */
const anchorOf = (protocol: Protocol, days: { enrolledOn: string; surgeryOn: string }): string =>
  protocol.document.anchor === 'surgery' ? days.surgeryOn : days.enrolledOn;

/** The next running number of the site. The update locks the site's row until this transaction ends: no gap and no twin. */
async function nextNumber(work: Work, siteId: string): Promise<{ number: number; siteCode: string; studyId: string; zone: string }> {
  const [row] = await work.sql<{ number: number; siteCode: string; studyId: string; zone: string }>(
    `update site set participant_count = participant_count + 1 where id = ? returning participant_count as number, code as "siteCode", study_id as "studyId", time_zone as zone`,
    [siteId],
  );
  if (!row) throw new Refusal('not-found', 'There is no such site.');
  return row;
}

/** Everything that hung on the screening hangs on the participant too. */
async function handOver(work: Work, screening: Screening, participantId: string): Promise<void> {
  for (const table of ['consent', 'eligibility_answer', 'participant_identity', 'stored_file'])
    await work.sql(`update ${table} set participant_id = ? where screening_id = ?`, [participantId, screening.id]);
}

/** An account that waits for its password, with the role of a participant on this one record. */
async function openAccount(work: Work, { participantId, code, siteId, studyId }: { participantId: string; code: string; siteId: string; studyId: string }): Promise<void> {
  const [account] = await work.sql<{ id: string }>(`insert into account (kind, label, state, created_at) values ('participant', ?, 'invited', ?) returning id`, [code, work.now]);
  await work.sql(
    `insert into role_grant (account_id, study_id, role, label, site_ids, of_participant_id, starts_at) values (?, ?, 'participant', ?, array[?::uuid], ?, ?)`,
    [account?.id, studyId, code, siteId, participantId, work.now],
  );
}

function describe(input: EnrolInput, is: { number: number; code: string; age: number; screening: Screening; enrolledOn: string; anchorOn: string; protocol: Protocol }) {
  return {
    siteId: is.screening.siteId,
    code: is.code,
    number: is.number,
    cohort: is.screening.cohort,
    affectedSide: input.affectedSide,
    dominantSide: input.dominantSide,
    ageYears: is.age,
    heightMm: input.heightCm,
    surgeryOn: input.surgeryOn,
    surgery: input.surgery,
    axillaryProcedure: input.axillaryProcedure,
    nodesRemoved: input.nodesRemoved,
    radiotherapy: input.radiotherapy,
    systemicTherapy: input.systemicTherapy,
    enrolledOn: is.enrolledOn,
    anchorOn: is.anchorOn,
    state: 'enrolled' as const,
    leftOn: null,
    leftGrade: null,
    leftReason: null,
    trainingHeld: false,
    protocolVersionId: is.protocol.id,
  } satisfies Partial<Participant>;
}

/** Facts that contradict each other are refused with both values. */
function checkFacts(input: EnrolInput, enrolledOn: string, daysSinceSurgery: number): void {
  const surgery = `Surgery on ${plainDate(input.surgeryOn)}`;
  if (input.surgeryOn > enrolledOn) throw new Refusal('invalid', `${surgery} is still to come. People are enrolled after it.`, 'surgeryOn');
  const days = daysBetween({ from: input.surgeryOn, to: enrolledOn });
  if (days < daysSinceSurgery) throw new Refusal('invalid', `${surgery} was ${days} days ago; the protocol asks for ${daysSinceSurgery} or more. Check the date, or wait with enrolment.`, 'surgeryOn');
  if (input.surgeryOn < '1960-01-01') throw new Refusal('invalid', `${surgery} is long ago. Check the year.`, 'surgeryOn');
  if (input.axillaryProcedure === 'none' && input.nodesRemoved > 0)
    throw new Refusal('invalid', `${input.nodesRemoved} nodes removed does not go with no axillary procedure. Check both.`, 'nodesRemoved');
}

/**
 * Enrols somebody whose eligibility is confirmed and whose consent is complete: issues the participant code, lays out
 * the schedule, opens the account and sends the invitation.
 * @throws Refusal 'conflict' without either; the data base refuses it as well, whoever asks.
 */
export async function enrolParticipant(work: Work, input: EnrolInput): Promise<EnrolledView> {
  const screening = await findScreening(work, input.id);
  const consents = await work.em.count(ConsentSchema, { screeningId: screening.id, state: 'complete' });
  assertEnrollable(screening, consents > 0);
  const { number, siteCode, studyId, zone } = await nextNumber(work, screening.siteId);
  const enrolledOn = localDate(work.now, zone);
  const protocol = await findProtocol(work, screening.protocolVersionId);
  checkFacts(input, enrolledOn, protocol.document.daysSinceSurgery);
  const age = await ageFrom(work, screening.id, enrolledOn);
  const code = participantCode(siteCode, number);
  const anchorOn = anchorOf(protocol, { enrolledOn, surgeryOn: input.surgeryOn });
  const participant = work.em.create(ParticipantSchema, describe(input, { number, code, age, screening, enrolledOn, anchorOn, protocol }));
  await work.em.flush();
  endInEnrolment(screening, participant.id);
  await work.em.flush();
  await handOver(work, screening, participant.id);
  const visitCount = await layOutSchedule(work, { siteId: screening.siteId, participantId: participant.id, anchorOn, protocol });
  await openAccount(work, { participantId: participant.id, code, siteId: screening.siteId, studyId });
  await work.later(participantInvite, { siteId: screening.siteId, participantId: participant.id });
  return { participantId: participant.id, code, visitCount };
}
