import { rangeChecks } from './range-check';

const base = { uses: 'this-sitting', source: 'common practice, no source' } as const;

export const sessionEffort = rangeChecks({ ...base, stem: 'session-effort', title: 'Effort', unit: '', decimals: 1, usual: [0, 10], limit: [0, 10] });
export const sessionLoadKg = rangeChecks({ ...base, stem: 'session-load', title: 'Load per hand', unit: 'kg', decimals: 1, usual: [0, 20], limit: [0, 150] });
export const sessionMinutes = rangeChecks({ ...base, stem: 'session-minutes', title: 'Minutes of a session', unit: 'min', decimals: 0, usual: [10, 120], limit: [1, 300] });
export const sessionReps = rangeChecks({ ...base, stem: 'session-reps', title: 'Repetitions', unit: '', decimals: 0, usual: [3, 30], limit: [1, 100] });
export const sessionSets = rangeChecks({ ...base, stem: 'session-sets', title: 'Sets', unit: '', decimals: 0, usual: [1, 6], limit: [1, 20] });
