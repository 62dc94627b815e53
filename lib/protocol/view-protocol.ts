import { swellingDefinition } from '@/instruments/swelling';
import { findExercise } from '@/instruments/training/exercises';
import { findQuestionnaire } from '@/instruments/questionnaires';
import type { Work } from '@/lib/work/work';
import { currentConsentForm, currentProtocol } from './find-protocol';
import type { ProtocolDocument } from './document';

/** A version as the list of versions shows it. */
export interface ProtocolVersionLine {
  readonly id: string;
  readonly number: string;
  readonly reason: string;
  readonly effectiveOn: string;
}

/** The version in force, its terms in words, and every version there was. */
export interface ProtocolView {
  readonly number: string;
  readonly effectiveOn: string;
  readonly document: ProtocolDocument;
  readonly primary: string;
  readonly alternatives: readonly string[];
  readonly exercises: readonly string[];
  /** Names of questionnaires by key. */
  readonly questionnaireNames: Readonly<Record<string, string>>;
  readonly consent: { readonly number: string; readonly title: string; readonly parts: readonly string[]; readonly permissions: readonly string[] };
  readonly versions: readonly ProtocolVersionLine[];
}

/** The protocol in force in words. @throws Refusal 'conflict' when none is. */
export async function viewProtocol(work: Work): Promise<ProtocolView> {
  const { number, effectiveOn, document } = await currentProtocol(work);
  const consent = await currentConsentForm(work);
  const versions = await work.sql<ProtocolVersionLine>('select id, number, reason, effective_on::text as "effectiveOn" from protocol_version order by effective_on desc, number desc');
  const keys = [...new Set(document.visits.flatMap(({ questionnaires }) => questionnaires))];
  return {
    number,
    effectiveOn,
    document,
    primary: swellingDefinition(document.swelling.primary).name,
    alternatives: document.swelling.alternatives.map((code) => swellingDefinition(code).name),
    exercises: document.exercises.map((code) => findExercise(code)?.name ?? code),
    questionnaireNames: Object.fromEntries(keys.map((key) => [key, findQuestionnaire(key)?.title ?? key])),
    consent: { number: consent.number, title: consent.form.title, parts: consent.form.sections.map(({ title }) => title), permissions: consent.form.permissions.map(({ text }) => text) },
    versions,
  };
}
