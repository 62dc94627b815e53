import type { ReportRow } from '@/lib/safety/list-open-reports';

/** Where a piece of work stands against today in its site's zone. */
export const workGroups = ['late', 'today', 'week', 'later'] as const;
export type WorkGroupKey = (typeof workGroups)[number];

/** What every piece of work has. Days are the site's own; moments are ISO strings. */
interface Common {
  readonly id: string;
  readonly group: WorkGroupKey;
  /** The day it is due, and the site's today beside it. */
  readonly dueOn: string;
  readonly today: string;
  readonly timeZone: string;
  readonly siteName: string;
  /** Participant code, or the number of the screening. */
  readonly code: string;
}

export interface VisitWork extends Common {
  readonly kind: 'visit';
  readonly name: string;
  readonly opensOn: string;
  readonly targetOn: string;
  readonly closesOn: string;
  readonly bookedAt: string | null;
  readonly bookedOn: string | null;
  readonly state: 'to come' | 'in progress';
  readonly formsDone: number;
  readonly formsOf: number;
}

export interface QueryWork extends Common {
  readonly kind: 'query';
  readonly number: string;
  readonly fieldLabel: string;
  readonly question: string;
  readonly raisedOn: string;
  readonly visitId: string | null;
  readonly visitName: string | null;
}

export interface ReportWork extends Common {
  readonly kind: 'report';
  readonly report: ReportRow;
  readonly reportedOn: string;
}

export interface ConsentWork extends Common {
  readonly kind: 'consent';
  readonly screeningId: string;
  readonly signedAt: string;
  readonly mode: string;
}

/** Questionnaires of one participant that are past their day, together. */
export interface QuestionWork extends Common {
  readonly kind: 'questionnaire';
  readonly names: readonly string[];
  readonly opensOn: string;
  readonly closesOn: string;
}

export type WorkItem = VisitWork | QueryWork | ReportWork | ConsentWork | QuestionWork;
export type WorkKind = WorkItem['kind'];

/** A site in reach with its own today. */
export interface TodaySite {
  readonly id: string;
  readonly name: string;
  readonly timeZone: string;
  readonly today: string;
  readonly recruitmentTarget: number;
}
