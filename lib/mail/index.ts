import type { AnyLetter } from './define-letter';
import { consentCopy } from './letters/consent-copy';
import { consentLink } from './letters/consent-link';
import { participantInvitation } from './letters/participant-invitation';
import { passwordReset } from './letters/password-reset';
import { queryRaised } from './letters/query-raised';
import { reportOverdue } from './letters/report-overdue';
import { reportWaiting } from './letters/report-waiting';
import { staffInvitation } from './letters/staff-invitation';

/** Every letter, alphabetical by name. */
export const letters: readonly AnyLetter[] = [consentCopy, consentLink, participantInvitation, passwordReset, queryRaised, reportOverdue, reportWaiting, staffInvitation];

/** The letter of that name. Throws RangeError when there is none. */
export function letterNamed(name: string): AnyLetter {
  const letter = letters.find((candidate) => candidate.name === name);
  if (!letter) throw new RangeError(`There is no letter '${name}'.`);
  return letter;
}
