import { ConsentFormVersionSchema } from '@/entities/consent-form-version';
import { ProtocolVersionSchema } from '@/entities/protocol-version';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { consentFormSchema, protocolSchema, type ConsentForm, type ProtocolDocument } from './document';

/** A version of the protocol and what it says. */
export interface Protocol {
  readonly id: string;
  readonly number: string;
  readonly effectiveOn: string;
  readonly document: ProtocolDocument;
}

/** The version a record was made under. @throws Refusal 'not-found'. */
export async function findProtocol(work: Work, id: string): Promise<Protocol> {
  const found = await work.em.findOne(ProtocolVersionSchema, { id });
  if (!found) throw new Refusal('not-found', 'There is no such protocol version.');
  return { id, number: found.number, effectiveOn: found.effectiveOn, document: protocolSchema.parse(found.document) };
}

/** The version in effect now. @throws Refusal 'conflict' when no version is in effect. */
export async function currentProtocol(work: Work, timeZone = 'UTC'): Promise<Protocol> {
  const [found] = await work.em.find(
    ProtocolVersionSchema,
    { effectiveOn: { $lte: localDate(work.now, timeZone) } },
    { orderBy: { effectiveOn: 'desc', number: 'desc' }, limit: 1 },
  );
  if (!found) throw new Refusal('conflict', 'No protocol version is in effect yet.');
  return { id: found.id, number: found.number, effectiveOn: found.effectiveOn, document: protocolSchema.parse(found.document) };
}

/** A consent form and what it says. */
export interface ConsentFormView {
  readonly id: string;
  readonly number: string;
  readonly effectiveOn: string;
  readonly form: ConsentForm;
}

/** The consent form in effect now. @throws Refusal 'conflict' when there is none. */
export async function currentConsentForm(work: Work, timeZone = 'UTC'): Promise<ConsentFormView> {
  const [found] = await work.em.find(
    ConsentFormVersionSchema,
    { effectiveOn: { $lte: localDate(work.now, timeZone) } },
    { orderBy: { effectiveOn: 'desc', number: 'desc' }, limit: 1 },
  );
  if (!found) throw new Refusal('conflict', 'No consent form is in effect yet.');
  return { id: found.id, number: found.number, effectiveOn: found.effectiveOn, form: consentFormSchema.parse(found.document) };
}

/** The consent form of a version. @throws Refusal 'not-found'. */
export async function findConsentForm(work: Work, id: string): Promise<ConsentFormView> {
  const found = await work.em.findOne(ConsentFormVersionSchema, { id });
  if (!found) throw new Refusal('not-found', 'There is no such consent form.');
  return { id, number: found.number, effectiveOn: found.effectiveOn, form: consentFormSchema.parse(found.document) };
}
