import type { AnyJob } from './define-job';
import { auditSeal } from './handlers/audit-seal';
import { mailSend } from './handlers/mail-send';

/** Every job, alphabetical by name. A queue for each is made when the data base is migrated. */
export const jobs: readonly AnyJob[] = [auditSeal, mailSend];
