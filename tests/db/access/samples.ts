import { randomUUID } from 'node:crypto';
import type { Subject } from './subjects';

/** A lawful-looking request to one address, about one subject. */
export interface Sample {
  readonly params?: Record<string, string>;
  readonly query?: Record<string, string>;
  readonly body?: unknown;
  /** The address names no row: other sites' rows must simply be absent from the answer. */
  readonly isList?: true;
}

const girths = Array.from({ length: 11 }, (_, level) => 160 + level * 13);
const weight = (s: Subject) => ({ table: 'limb_assessment', id: s.assessmentId, field: 'body_weight_g' });
const visitDay = (s: Subject) => ({ table: 'visit', id: s.visitId, field: 'done_on' });
const byId = (pick: (s: Subject) => string, body?: unknown) => (s: Subject): Sample => ({ params: { id: pick(s) }, ...(body === undefined ? {} : { body }) });
const list = (): Sample => ({ isList: true });

/**
 * One sample for every address and method; the walk fails on an address without one.
 * What is sent is valid, so that only who asks decides.
 */
export const samples: Readonly<Record<string, (s: Subject) => Sample>> = {
  'PUT /api/assessments/{id}/circumstances': byId((s) => s.assessmentId, { position: 'hanging', sleeveWorn: false, hoursSinceTraining: 20, bodyWeightG: 70_000, impedanceRatio: 1.01, impedanceRestMin: 10, remarks: null }),
  'POST /api/assessments/{id}/complete': byId((s) => s.assessmentId, { kept: [] }),
  'PUT /api/assessments/{id}/trials/{side}/{trial}': (s) => ({ params: { id: s.assessmentId, side: 'left', trial: '1' }, body: { circumferencesMm: girths } }),
  'GET /api/audit': list,
  'GET /api/audit/file': list,
  'GET /api/arm': list,
  'POST /api/arm/check': () => ({ isList: true, body: { clientKey: randomUUID(), armCheck: 'the same' } }),
  'GET /api/consents/{id}': byId((s) => s.consentId),
  'POST /api/consents/{id}/countersign': byId((s) => s.consentId, { agreed: true, name: 'Robin Ashdown', password: 'is not asked in the walk' }),
  'GET /api/consents/{id}/file/{which}': (s) => ({ params: { id: s.consentId, which: 'copy' } }),
  'POST /api/consents/{id}/link': byId((s) => s.consentId, {}),
  'POST /api/consents/{id}/paper': byId((s) => s.consentId, {}),
  'POST /api/consents/{id}/paper-signature': byId((s) => s.consentId, { signedOn: '2026-10-01', statements: [], permissions: {} }),
  'POST /api/consents/{id}/parts': byId((s) => s.consentId, { part: 'key-facts' }),
  'POST /api/consents/{id}/sign': byId((s) => s.consentId, { statements: [], permissions: {}, signature: { kind: 'typed', name: 'Ada Example' } }),
  'POST /api/corrections': (s) => ({ body: { target: weight(s), value: 71_000, reason: 'Read again from the sheet.' } }),
  // An extract belongs to the study, not to a site: every role that may, reaches the same one.
  'GET /api/extracts': list,
  'POST /api/extracts': () => ({ isList: true, body: { profile: 'open', purpose: 'To see who may ask.', recipient: 'Nobody' } }),
  'GET /api/extracts/preview': list,
  'GET /api/extracts/{id}': (s) => ({ isList: true, params: { id: s.extractId } }),
  'GET /api/extracts/{id}/files/{name}': (s) => ({ isList: true, params: { id: s.extractId, name: 'participants.csv' } }),
  'POST /api/extracts/{id}/retry': (s) => ({ isList: true, params: { id: s.extractId }, body: {} }),
  'GET /api/flags': list,
  'POST /api/flags/{id}/seen': byId((s) => s.flagId, {}),
  'GET /api/history': (s) => ({ query: visitDay(s) }),
  'POST /api/invitations': (s) => ({ body: { participantId: s.participant.id } }),
  'GET /api/lifting': list,
  'GET /api/participants': () => ({ isList: true, query: { pageSize: '100' } }),
  'GET /api/participants/{code}': (s) => ({ params: { code: s.participant.code } }),
  'POST /api/participants/{code}/facts': (s) => ({ params: { code: s.participant.code }, body: { field: 'surgery', value: 'mastectomy', reason: 'Read from the letter.' } }),
  'POST /api/participants/{code}/identity': (s) => ({ params: { code: s.participant.code }, body: {} }),
  'GET /api/people': list,
  'GET /api/queries': () => ({ isList: true, query: { pageSize: '100' } }),
  'POST /api/queries': (s) => ({ body: { target: visitDay(s), question: 'Which day does the diary give?' } }),
  'POST /api/queries/close': (s) => ({ body: { ids: [s.queryId], reason: 'Answered.' } }),
  'POST /api/queries/{id}/answer': byId((s) => s.queryId, { answer: 'It was.' }),
  'POST /api/queries/{id}/ask-again': byId((s) => s.queryId, { question: 'And the shoes?' }),
  'POST /api/queries/{id}/cancel': byId((s) => s.queryId, { reason: 'Asked in error.' }),
  'POST /api/queries/{id}/close': byId((s) => s.queryId, {}),
  'POST /api/queries/{id}/remind': byId((s) => s.queryId, {}),
  'GET /api/questionnaires': list,
  'GET /api/questionnaires/{id}': byId((s) => s.responseId),
  'PUT /api/questionnaires/{id}': byId((s) => s.responseId, { answers: {}, page: 0 }),
  'POST /api/questionnaires/{id}/submit': byId((s) => s.responseId, { answers: {} }),
  'GET /api/results': list,
  'GET /api/screenings': () => ({ isList: true, query: { pageSize: '100' } }),
  'POST /api/screenings': (s) => ({ body: { name: 'Ada Example', email: '', phone: '', bornOn: '1970-01-01', siteId: s.site.id, cohort: 'at-risk', screenedOn: '2026-11-01', referredBy: '' } }),
  'GET /api/screenings/{id}': byId((s) => s.openScreeningId),
  'PUT /api/screenings/{id}/answers': byId((s) => s.openScreeningId, { criterion: 'adult', answer: 'yes' }),
  'POST /api/screenings/{id}/confirm': byId((s) => s.openScreeningId, {}),
  'POST /api/screenings/{id}/consents': byId((s) => s.openScreeningId, { mode: 'tablet' }),
  'POST /api/screenings/{id}/enrol': byId((s) => s.openScreeningId, {
    affectedSide: 'left', dominantSide: 'right', surgeryOn: '2026-08-01', surgery: 'mastectomy', axillaryProcedure: 'none', nodesRemoved: '0', radiotherapy: 'none', systemicTherapy: 'none', heightCm: '165',
  }),
  'GET /api/screenings/{id}/identity': byId((s) => s.screeningId),
  'PUT /api/screenings/{id}/identity': byId((s) => s.screeningId, { name: 'Ada Example', email: '', phone: '', bornOn: '1970-01-01' }),
  'POST /api/screenings/{id}/leave': byId((s) => s.openScreeningId, { notEnrolledReason: 'Not eligible', note: '' }),
  'GET /api/symptoms': list,
  'POST /api/symptoms': () => ({ isList: true, body: { clientKey: randomUUID(), noticedOn: '2026-11-01', signs: [], lastedOverADay: null, soreness: null, note: null } }),
  'GET /api/symptoms/{id}': byId((s) => s.reportId),
  'POST /api/symptoms/{id}/read': byId((s) => s.reportId, {}),
  'POST /api/symptoms/{id}/review': byId((s) => s.reportId, { outcome: 'advice', note: 'Spoken by telephone.' }),
  'GET /api/training': list,
  'GET /api/today': list,
  'POST /api/training': () => ({ isList: true, body: { clientKey: randomUUID(), on: '2026-11-03', armCheck: 'the same', soreness: 'no', effort: null, note: null, sets: [{ exercise: 'chest-press', equipment: 'dumbbell', basis: 'per hand', side: 'both', typed: 1, unit: 'kg', repetitions: 10, setCount: 2, effort: null, alreadyLifted: false }] } }),
  'POST /api/verifications': (s) => ({ body: { targets: [{ ...visitDay(s), value: null }] } }),
  'POST /api/visits': (s) => ({ body: { code: s.participant.code, on: '2026-12-20', why: 'After a report.' } }),
  'GET /api/visits/{id}/assessment': byId((s) => s.visitId),
  'POST /api/visits/{id}/assessment': byId((s) => s.laterVisitId, {}),
  'POST /api/visits/{id}/begin': byId((s) => s.laterVisitId, {}),
  'POST /api/visits/{id}/book': byId((s) => s.laterVisitId, { on: '2026-12-30', time: '09:30' }),
  'POST /api/visits/{id}/complete': byId((s) => s.visitId, {}),
  'POST /api/visits/{id}/miss': byId((s) => s.laterVisitId, { missedReason: 'Was ill.' }),
  'POST /api/visits/{id}/undo': byId((s) => s.visitId, { reason: 'Begun at the wrong line.' }),
  'GET /api/week': list,
};
