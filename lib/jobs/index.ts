import type { AnyJob } from './define-job';
import { auditSeal } from './handlers/audit-seal';
import { consentCopy } from './handlers/consent-copy';
import { consentLink } from './handlers/consent-link';
import { extractPrepare } from './handlers/extract-prepare';
import { mailSend } from './handlers/mail-send';
import { participantInvite } from './handlers/participant-invite';
import { questionnairesMissed } from './handlers/questionnaires-missed';
import { reportsLetter } from './handlers/reports-letter';
import { reportsOverdue } from './handlers/reports-overdue';
import { reportsWaiting } from './handlers/reports-waiting';

/** Every job, alphabetical by name. A queue for each is made when the data base is migrated. */
export const jobs: readonly AnyJob[] = [
  auditSeal,
  consentCopy,
  consentLink,
  extractPrepare,
  mailSend,
  participantInvite,
  questionnairesMissed,
  reportsLetter,
  reportsOverdue,
  reportsWaiting,
];
