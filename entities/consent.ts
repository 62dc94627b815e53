import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { screeningBase } from './columns';
import { lawful } from './lawful';

/** Consent on one form version, in one way: tablet, home or paper. */
export const ConsentSchema = defineEntity({
  name: 'Consent',
  tableName: 'consent',
  properties: {
    ...screeningBase(),
    formVersionId: p.uuid(),
    mode: p.enum(['tablet', 'home', 'paper']),
    state: p.enum(['reading', 'signed by participant', 'complete', 'set aside']),
    sectionsRead: p.array<string>(),
    permissions: p.json<Record<string, 'yes' | 'no'>>(),
    paperFileId: p.uuid().nullable(),
    paperSignedOn: p.date().nullable(),
    participantSignedAt: p.datetime().nullable(),
    staffSignedAt: p.datetime().nullable(),
    staffSignedBy: p.uuid().nullable(),
    copyFileId: p.uuid().nullable(),
    createdAt: p.datetime(),
  },
});
export type Consent = InferEntity<typeof ConsentSchema>;

/** The participant's signature. Every section must have been read and every permission answered first. */
export function signByParticipant(consent: Consent, needs: { sections: readonly string[]; permissions: readonly string[] }, at: Date): void {
  lawful(consent.state === 'reading', 'This consent is already signed.');
  const unread = needs.sections.filter((key) => !consent.sectionsRead.includes(key));
  lawful(unread.length === 0, `Read every part before signing: ${unread.length} still to read.`, 'invalid');
  const open = needs.permissions.filter((key) => consent.permissions[key] === undefined);
  lawful(open.length === 0, `Answer each optional permission, yes or no: ${open.length} still open.`, 'invalid');
  consent.state = 'signed by participant';
  consent.participantSignedAt = at;
}

/** The second signature, by the person who took consent. Completes it. */
export function signByStaff(consent: Consent, by: string, at: Date): void {
  lawful(consent.state === 'signed by participant', 'The participant signs first.');
  consent.state = 'complete';
  consent.staffSignedAt = at;
  consent.staffSignedBy = by;
}

/** Another way of consenting, or a newer form. What was read stays read as long as the form is the same. */
export function changeMode(consent: Consent, mode: Consent['mode']): void {
  lawful(consent.state === 'reading', 'This consent is already signed.');
  consent.mode = mode;
}

/** The consent will not be signed: a newer form has taken its place. */
export function setAside(consent: Consent): void {
  lawful(consent.state === 'reading', 'This consent is already signed.');
  consent.state = 'set aside';
}
