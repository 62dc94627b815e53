import { QuestionnaireResponseSchema, type QuestionnaireResponse } from '@/entities/questionnaire-response';
import { addDays } from '@/instruments/calendar';
import { findQuestionnaire } from '@/instruments/questionnaires';
import { elementsOf } from '@/instruments/questionnaires/define-questionnaire';
import { findOwnRecord } from '@/lib/people/find-own-record';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** One questionnaire in a participant's list. */
export interface QuestionnaireRow {
  readonly id: string;
  readonly title: string;
  readonly minutes: number;
  /** Questions everybody is asked, and those that an answer has opened. */
  readonly itemCount: number;
  /** Answered, or left out on purpose. */
  readonly doneCount: number;
  readonly state: QuestionnaireResponse['state'];
  readonly dueOn: string;
  readonly opensOn: string;
  readonly closesOn: string;
  readonly submittedOn: string | null;
  /** Submitted, or still open, after its due day. */
  readonly isLate: boolean;
}

export interface QuestionnaireList {
  readonly today: string;
  readonly open: readonly QuestionnaireRow[];
  readonly soon: readonly QuestionnaireRow[];
  readonly past: readonly QuestionnaireRow[];
}

const soonDays = 120;

/** The questionnaires of the participant who is signed in: open now, coming, and past. */
export async function listQuestionnaires(work: Work): Promise<QuestionnaireList> {
  const { participant, site, today } = await findOwnRecord(work);
  const found = await work.em.find(QuestionnaireResponseSchema, { participantId: participant.id }, { orderBy: { dueOn: 'asc', instrument: 'asc' } });
  const rows = found.flatMap((response): QuestionnaireRow[] => {
    const questionnaire = findQuestionnaire(response.instrument, response.instrumentVersion);
    if (!questionnaire) return [];
    const submittedOn = response.submittedAt ? localDate(response.submittedAt, site.timeZone) : null;
    return [
      {
        id: response.id,
        title: questionnaire.title,
        minutes: questionnaire.minutes,
        itemCount: elementsOf(questionnaire.survey).filter(({ name, visibleIf }) => visibleIf === undefined || name in response.answers).length,
        doneCount: new Set([...Object.keys(response.answers), ...response.leftOut]).size,
        state: response.state,
        dueOn: response.dueOn,
        opensOn: response.opensOn,
        closesOn: response.closesOn,
        submittedOn,
        isLate: (submittedOn ?? today) > response.dueOn,
      },
    ];
  });
  const isUnsent = ({ state }: QuestionnaireRow) => state === 'due' || state === 'in progress';
  return {
    today,
    open: rows.filter((row) => isUnsent(row) && row.opensOn <= today && row.closesOn >= today),
    soon: rows.filter((row) => isUnsent(row) && row.opensOn > today && row.opensOn <= addDays(today, soonDays)),
    past: rows.filter((row) => !isUnsent(row) || row.closesOn < today).toReversed(),
  };
}
