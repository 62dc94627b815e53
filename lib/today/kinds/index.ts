import { consentWork } from './consent';
import { queryWork } from './query';
import { questionnaireWork } from './questionnaire';
import { reportWork } from './report';
import { visitWork } from './visit';

/** The kinds of work on Today, in the order in which they stand where day, time and code are the same. */
export const workKinds = [visitWork, queryWork, reportWork, consentWork, questionnaireWork] as const;

export type WorkItem = ReturnType<(typeof workKinds)[number]['item']>;
