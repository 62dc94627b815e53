import type { LocalDate } from '../calendar';
import type { ImpedanceCutoffSet } from '../measurement/impedance-ratio';
import type { LimbPair } from '../measurement/limb';

/** What a definition may look at: one assessment, both arms named by risk. `null` = not measured or not asked. */
export interface SwellingAssessment extends LimbPair {
  readonly on: LocalDate;
  /** Days since the latest surgery on the at-risk side; negative before it, null when unknown. */
  readonly daysSinceSurgery: number | null;
  readonly weightKg: number | null;
  readonly impedance: { readonly atRiskOhm: number; readonly unaffectedOhm: number } | null;
  /** Reported heaviness or swelling, now or within 12 months. */
  readonly reportedSymptoms: boolean | null;
  readonly clinicianDiagnosed: boolean | null;
}

/** Settings of the protocol version and facts of the participant that do not change between visits. */
export interface SwellingContext {
  readonly atRiskIsDominant: boolean | null;
  readonly impedanceCutoffs: ImpedanceCutoffSet;
  /** Early swelling up to and including this many days after surgery is not counted where a definition says so. */
  readonly earlyExclusionDays: number;
  /** D9: growth of the inter-limb difference, in percentage points. */
  readonly interLimbIncrease: { readonly points: number; readonly bound: 'at least' | 'above' };
  /** Set when visit and baseline may not be compared (another method, another map); change is then not judged. */
  readonly notComparable?: string;
}

export const defaultSwellingContext: SwellingContext = {
  atRiskIsDominant: null,
  impedanceCutoffs: '2011-3sd',
  earlyExclusionDays: 91,
  interLimbIncrease: { points: 5, bound: 'at least' },
};

export interface SwellingVerdict {
  readonly verdict: 'met' | 'not met' | 'not judged';
  /** The number judged, in `unit`; null when there is none. */
  readonly value: number | null;
  readonly unit: 'mm' | 'mL' | '%' | 'points' | 'ratio' | '';
  /** What was compared with what, or why it could not be. */
  readonly reason: string;
}

export interface SwellingDefinition {
  readonly code: string;
  readonly name: string;
  /** One sentence that states the rule as the protocol would print it. */
  readonly sentence: string;
  readonly needsBaseline: boolean;
  readonly source: string;
  /** The line on the scale of relative volume change, in percent, where the definition is one. */
  readonly rvcLinePct?: number;
  judge(assessment: SwellingAssessment, baseline: SwellingAssessment | null, context: SwellingContext): SwellingVerdict;
}

/** Types a definition of swelling; the registry in `index.ts` lists it. Baseline and comparability are asked here, once. */
export function defineSwelling(definition: SwellingDefinition): SwellingDefinition {
  return {
    ...definition,
    judge(assessment, baseline, context) {
      if (definition.needsBaseline && baseline === null) return notJudged('There is no baseline to compare with.');
      if (definition.needsBaseline && context.notComparable) return notJudged(context.notComparable);
      return definition.judge(assessment, baseline, context);
    },
  };
}

export function notJudged(reason: string): SwellingVerdict {
  return { verdict: 'not judged', value: null, unit: '', reason };
}

export function verdict(met: boolean, value: number, unit: SwellingVerdict['unit'], reason: string): SwellingVerdict {
  return { verdict: met ? 'met' : 'not met', value, unit, reason };
}
