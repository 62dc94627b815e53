import type { TrainingSession } from '../training/session';
import type { Finding } from './define-edit-check';
import { sessionEffort, sessionLoadKg, sessionMinutes, sessionReps, sessionSets } from './session-ranges';

/** Where in a session a finding belongs: indexes of entry and set, or neither. */
export type SessionFinding = Finding & { readonly at: { readonly entry?: number; readonly set?: number } };

/**
 * Whether a session's numbers are believable. The training rules judge whether they keep the rules; these two are apart.
 * `minutes` and `effort` (CR10) are null when not given.
 */
export function checkTrainingEntry(session: Pick<TrainingSession, 'entries'>, { minutes, effort }: { minutes: number | null; effort: number | null }): SessionFinding[] {
  const whole = [
    minutes === null ? null : (sessionMinutes.limit.run(minutes) ?? sessionMinutes.range.run(minutes)),
    effort === null ? null : sessionEffort.limit.run(effort),
  ];
  const byEntry = session.entries.flatMap((entry, entryIndex) => [
    ...at(sessionSets.limit.run(entry.sets.length) ?? sessionSets.range.run(entry.sets.length), { entry: entryIndex }),
    ...entry.sets.flatMap((set, setIndex) => [
      ...at(sessionReps.limit.run(set.reps) ?? sessionReps.range.run(set.reps), { entry: entryIndex, set: setIndex }),
      ...at(set.loadKg === null ? null : loadFinding(set.loadKg, entry.basis), { entry: entryIndex, set: setIndex }),
    ]),
  ]);
  return [...whole.flatMap((finding) => at(finding, {})), ...byEntry];
}

/** The usual range is per hand; a bar or machine may carry more, so only the limit binds there. */
function loadFinding(loadKg: number, basis: TrainingSession['entries'][number]['basis']): Finding | null {
  return sessionLoadKg.limit.run(loadKg) ?? (basis === 'per hand' ? sessionLoadKg.range.run(loadKg) : null);
}

function at(finding: Finding | null, place: SessionFinding['at']): SessionFinding[] {
  return finding ? [{ ...finding, at: place }] : [];
}
