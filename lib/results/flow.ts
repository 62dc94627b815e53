import type { ParticipantFlow } from '@/lib/summary/participant-flow';
import { foldSmall, type ShownCount } from './hide-small';

/** One stage of the flow, and who left before the next one. */
export interface FlowStageView {
  readonly name: string;
  readonly people: number;
  /** Null where nobody can leave after it. */
  readonly out: { readonly reasons: readonly { readonly reason: string; readonly count: ShownCount }[] } | null;
}

type Stage = { name: string; people: number; reasons: { reason: string; count: number }[] };

function everyStage({ screened, screening, notEnrolled, enrolled, withBaseline, followed }: ParticipantFlow): Stage[] {
  const before = (index: number) => (index === 0 ? withBaseline : (followed[index - 1]?.measured ?? 0));
  const leaving = (index: number) => {
    const next = followed[index];
    return next ? [{ reason: 'not yet due', count: before(index) - next.due }, { reason: 'not measured', count: next.due - next.measured }] : [];
  };
  return [
    { name: 'Screened', people: screened, reasons: [...notEnrolled, { reason: 'still in screening', count: screening }] },
    { name: 'Enrolled', people: enrolled, reasons: [{ reason: 'no complete baseline', count: enrolled - withBaseline }] },
    { name: 'Baseline done', people: withBaseline, reasons: leaving(0) },
    ...followed.map(({ months, measured }, index) => ({ name: `Month ${months} seen`, people: measured, reasons: leaving(index + 1) })),
  ];
}

/**
 * The stages as they may be shown. Under a limit a stage with fewer people than that is left out, and so is one that
 * differs from the stage before by fewer: the difference would be a small count.
 */
export function viewFlow(flow: ParticipantFlow, below: number): FlowStageView[] {
  const shown: Stage[] = [];
  for (const stage of everyStage(flow)) {
    const last = shown.at(-1);
    const lost = last ? last.people - stage.people : 0;
    const isSmall = stage.people < below || (lost > 0 && lost < below);
    if (!isSmall) shown.push(stage);
    else if (last) last.reasons = [...last.reasons, ...stage.reasons];
  }
  return shown.map(({ name, people, reasons }, index) => {
    const leaving = reasons.filter(({ count }) => count > 0);
    return { name, people, out: index === shown.length - 1 || leaving.length === 0 ? null : { reasons: foldSmall(leaving, below) } };
  });
}
