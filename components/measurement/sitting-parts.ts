import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { columnMm, typedFrom, type Typed } from './typed-sitting';
import type { AnyAssessment, FormPart } from './use-kept-sitting';

type About = Pick<OpenAssessmentView, 'id' | 'map'>;
const passes = ([1, 2, 3] as const).flatMap((trial) => (['left', 'right'] as const).map((side) => ({ side, trial })));

/** The form as the parts that are saved: what stands beside the tape, and each column that holds a reading or held one. */
export function partsOfForm({ id, map, trials }: About & Pick<OpenAssessmentView, 'trials'>, typed: Typed, circumstances: OpenAssessmentView['circumstances']): FormPart[] {
  const columns = passes.map(({ side, trial }) => ({
    key: `${side} ${trial}`,
    path: `/api/assessments/${id}/trials/${side}/${trial}`,
    body: { circumferencesMm: columnMm(typed, side, trial, map.levelCount) },
    isKept: trials.some((row) => row.side === side && row.trial === trial),
  }));
  return [
    { key: 'circumstances', path: `/api/assessments/${id}/circumstances`, body: { ...circumstances } },
    ...columns.flatMap(({ isKept, ...part }) => (isKept || part.body.circumferencesMm.some((mm) => mm !== null) ? [part] : [])),
  ];
}

/** The same parts as the server has them. */
export const partsOfView = (view: AnyAssessment): FormPart[] => partsOfForm(view, typedFrom(view.trials), view.circumstances);
