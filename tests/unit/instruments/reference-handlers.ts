import { addMonths, placeInWindow, visitWindow, windowGaps } from '@/instruments/calendar';
import { digitPreference } from '@/instruments/checks/assessor';
import { dateOrderFlags } from '@/instruments/checks/dates';
import { girthIfInchesCm, girthLimit } from '@/instruments/checks/girth';
import { changePct, unaffectedChange } from '@/instruments/checks/since-last-visit';
import { leftRightSwap } from '@/instruments/checks/swap';
import { taperViolations } from '@/instruments/checks/taper';
import { combineTrials } from '@/instruments/measurement/combine-trials';
import { areComparable, type MethodIdentity } from '@/instruments/measurement/comparable';
import { cutoffFromNorm, impedanceCutoff, impedanceRatio, isAboveCutoff } from '@/instruments/measurement/impedance-ratio';
import type { GirthMethodCode, MeasurementMethodCode } from '@/instruments/measurement/index';
import { changeOfDifference, interLimbDifference } from '@/instruments/measurement/inter-limb-difference';
import { limbVolume } from '@/instruments/measurement/limb-volume';
import { relativeVolumeChange } from '@/instruments/measurement/relative-volume-change';
import { weightAdjustedChange } from '@/instruments/measurement/weight-adjusted-change';
import { changeOfScore, scoreScale } from '@/instruments/questionnaires/score';
import { defaultSwellingContext, type SwellingAssessment, type SwellingContext } from '@/instruments/swelling/define-swelling';
import { ctcaeGradeBySize, dominanceCategory, DOMINANT_ARM_EXCESS_PCT, islSeverity } from '@/instruments/swelling/grading';
import { type SwellingCode, swellingDefinition } from '@/instruments/swelling/index';
import { excludeEarly, firstOccurrence, sustained } from '@/instruments/swelling/occurrence';
import { isAtLeast } from '@/instruments/threshold';
import { resumeWindow } from '@/instruments/training/load-facts';
import { judgeSessions } from '@/instruments/training/judge-sessions';
import { adherencePct, oneRepMax, relativeDosePct, resumeTwoWeeksPerWeek, sessionLoad, volumeLoad, weeklyProgression } from '@/instruments/training/measures';
import type { ExerciseEntry, TrainingSession } from '@/instruments/training/session';
import { defaultTrainingSettings } from '@/instruments/training/settings';
import { bmi, inchesToCm, massToKg } from '@/instruments/units';

type Inputs = Record<string, unknown>;
type Handler = (inputs: Inputs, expected: Inputs) => unknown;

const list = (value: unknown): number[] => value as number[];
const num = (value: unknown): number => value as number;
const text = (value: unknown): string => value as string;
const toMm = (cm: readonly number[]): number[] => cm.map((value) => value * 10);

/** Volume in mL of an arm measured in centimetres at equal steps. */
function volume(method: GirthMethodCode, girthsCm: readonly number[], stepCm: number): number {
  return limbVolume({ method, girthsMm: toMm(girthsCm), map: { startOffsetMm: 0, stepMm: stepCm * 10, levels: girthsCm.length } }).volumeMl ?? Number.NaN;
}

const VOL_03 = [16.0, 17.2, 19.0, 21.2, 23.4, 25.1, 26.0, 26.4, 27.0, 28.2, 29.6];
const base = volume('frustum', VOL_03, 4);
const deltaFrom = (volumeMl: number) => ({ volume_ml: volumeMl, delta_ml: volumeMl - base, delta_pct: 100 * (volumeMl / base - 1) });

function frustumVolume(inputs: Inputs) {
  const inches = inputs.circumferences_in === undefined ? null : list(inputs.circumferences_in);
  const girthsCm = inches ? inches.map(inchesToCm) : list(inputs.circumferences_cm);
  const stepCm = inches ? inchesToCm(num(inputs.segment_in)) : num(inputs.segment_cm);
  const result = limbVolume({ method: 'frustum', girthsMm: toMm(girthsCm), map: { startOffsetMm: 0, stepMm: stepCm * 10, levels: girthsCm.length } });
  const volumeMl = result.volumeMl ?? Number.NaN;
  const last = girthsCm.at(-1) ?? 0;
  return {
    volume_ml: volumeMl,
    segments_ml: result.segmentsMl,
    cylinder_ml: volume('disk', girthsCm.slice(0, 1), stepCm),
    diff_vs_4cm_ml: volumeMl - base,
    diff_vs_4cm_pct: 100 * (volumeMl / base - 1),
    closed_form_ml: (40 * last ** 2) / (12 * Math.PI),
    circumferences_cm: girthsCm,
    segment_cm: stepCm,
  };
}

function taperedVolume({ start_cm, end_cm, length_cm, segments }: Inputs) {
  const [start, end, length, n] = [num(start_cm), num(end_cm), num(length_cm), num(segments)];
  const girthAt = (share: number): number => start + (end - start) * share;
  const disks = (shift: number): number => volume('disk', Array.from({ length: n }, (_, i) => girthAt((i + shift) / n)), length / n);
  return {
    frustum_ml: volume('frustum', Array.from({ length: n + 1 }, (_, i) => girthAt(i / n)), length / n),
    disk_midpoint_ml: disks(0.5),
    disk_proximal_ml: disks(1),
    disk_distal_ml: disks(0),
    closed_form_ml: (length * (start ** 2 + start * end + end ** 2)) / (12 * Math.PI),
  };
}

function curvedLimb({ c_4cm, c_10cm }: Inputs) {
  const steps = 20_000;
  const area = (x: number): number => (16 + 14 * Math.sin((Math.PI * x) / 80)) ** 2 / (4 * Math.PI);
  const width = 40 / steps;
  const trueMl = Array.from({ length: steps }, (_, i) => area((i + 0.5) * width) * width).reduce((sum, slice) => sum + slice, 0);
  const four = volume('frustum', list(c_4cm), 4);
  const ten = volume('frustum', list(c_10cm), 10);
  return { true_ml: trueMl, frustum_4cm_ml: four, frustum_10cm_ml: ten, bias_4cm_pct: 100 * (four / trueMl - 1), bias_10cm_pct: 100 * (ten / trueMl - 1) };
}

function shiftedStart({ circumferences_cm, used_start_cm }: Inputs) {
  const girths = list(circumferences_cm);
  const share = num(used_start_cm) / 4;
  const shifted = girths.map((girth, i) => {
    const step = i + 1 < girths.length ? (girths[i + 1] ?? girth) - girth : girth - (girths[i - 1] ?? girth);
    return girth + step * share;
  });
  return { shifted_circumferences_cm: shifted, ...deltaFrom(volume('frustum', shifted, 4)) };
}

function relativeChange({ A1_ml, U1_ml, A2_ml, U2_ml }: Inputs) {
  const [a1, u1, a2, u2] = [num(A1_ml), num(U1_ml), num(A2_ml), num(U2_ml)];
  const rvc = relativeVolumeChange({ baselineAtRiskMl: a1, baselineUnaffectedMl: u1, atRiskMl: a2, unaffectedMl: u2 });
  const difference = interLimbDifference({ atRisk: { volumeMl: a2, girthsMm: [] }, unaffected: { volumeMl: u2, girthsMm: [] } });
  return {
    rvc,
    rvc_pct: rvc * 100,
    interlimb_diff_ml: difference.differenceMl,
    interlimb_diff_pct: difference.differencePct,
    abs_change_ml: a2 - a1,
    abs_change_pct: changePct({ before: a1, now: a2 }),
    ge5: isAtLeast(rvc, 0.05),
    ge10: isAtLeast(rvc, 0.1),
  };
}

function assessmentOf(row: unknown, daysSinceSurgery: number): SwellingAssessment & { visit: string } {
  const [visit, affectedMl, otherMl, affectedCm, otherCm, atRiskOhm, unaffectedOhm] = row as [string, number, number, number[], number[], number, number];
  return {
    visit,
    on: '2024-01-01',
    daysSinceSurgery,
    // Readings to 0.1 cm are stored as whole millimetres.
    atRisk: { volumeMl: affectedMl, girthsMm: affectedCm.map((cm) => Math.round(cm * 10)) },
    unaffected: { volumeMl: otherMl, girthsMm: otherCm.map((cm) => Math.round(cm * 10)) },
    weightKg: null,
    impedance: { atRiskOhm, unaffectedOhm },
    reportedSymptoms: null,
    clinicianDiagnosed: null,
  };
}

function caseTimeline({ visits }: Inputs) {
  const assessments = (visits as unknown[]).map((row) => assessmentOf(row, 200));
  const baseline = assessments[0];
  if (!baseline) throw new Error('The timeline is empty.');
  const firstMet = (code: SwellingCode, over: Partial<SwellingContext> = {}): string | null => {
    const context = { ...defaultSwellingContext, ...over };
    const timeline = assessments.map((assessment, day) => ({ day, scheduled: true, verdict: swellingDefinition(code).judge(assessment, baseline, context).verdict }));
    return assessments[firstOccurrence(timeline)?.index ?? -1]?.visit ?? null;
  };
  return {
    per_visit: assessments.map((assessment) => ({
      visit: assessment.visit,
      rvc_pct: swellingDefinition('D5').judge(assessment, baseline, defaultSwellingContext).value,
      interlimb_pct: interLimbDifference(assessment).differencePct,
      interlimb_ml: interLimbDifference(assessment).differenceMl,
      change_affected_ml: swellingDefinition('D4').judge(assessment, baseline, defaultSwellingContext).value,
      max_interlimb_cm: (interLimbDifference(assessment).maxGirth?.differenceMm ?? Number.NaN) / 10,
      max_change_of_interlimb_cm: (changeOfDifference({ now: assessment, baseline })?.differenceMm ?? Number.NaN) / 10,
      bis_ratio: assessment.impedance && impedanceRatio(assessment.impedance),
    })),
    first_positive: {
      interlimb_2cm: firstMet('D1'),
      change_2cm: firstMet('D2'),
      interlimb_200ml: firstMet('D3'),
      affected_200ml: firstMet('D4'),
      interlimb_gt10pct: firstMet('D7'),
      rvc5: firstMet('D5'),
      rvc10: firstMet('D6'),
      bis_dominant_1139: firstMet('D8', { impedanceCutoffs: '2001-3sd', atRiskIsDominant: true }),
      bis_nondominant_1066: firstMet('D8', { impedanceCutoffs: '2001-3sd', atRiskIsDominant: false }),
    },
  };
}

function earlyExclusion({ visits, min_days_postop, threshold_pct }: Inputs) {
  const timeline = (visits as { days_postop: number; rvc_pct: number }[]).map(({ days_postop, rvc_pct }) => ({
    day: days_postop,
    scheduled: true,
    verdict: isAtLeast(rvc_pct, num(threshold_pct)) ? ('met' as const) : ('not met' as const),
  }));
  const onset = firstOccurrence(excludeEarly(timeline, { surgeryDay: 0, days: num(min_days_postop) }));
  return { case: onset !== null, onset_days_postop: onset?.day ?? null };
}

function loadRules({ entries, baseline, assess, cfg }: Inputs) {
  type Entry = { date: string; exercise: string; load: number; changed: boolean | null; unit?: 'kg' | 'lb'; equipment?: 'dumbbell' | 'cable' | 'machine'; side?: 'left' | 'right' };
  const sessions = new Map<string, TrainingSession>();
  for (const { date, exercise, load, changed, unit = 'kg', equipment = 'dumbbell', side = 'both' } of entries as Entry[]) {
    const earlier = sessions.get(date);
    const entry: ExerciseEntry = { exercise, equipment, side, basis: 'per hand', sets: [{ reps: 10, loadKg: massToKg(load, unit) }] };
    sessions.set(date, { id: date, on: date, armChanged: changed, entries: [...(earlier?.entries ?? []), entry] });
  }
  const settings = { ...defaultTrainingSettings, toleranceKg: (cfg as { tol?: number } | undefined)?.tol ?? 0 };
  const flags = judgeSessions([...sessions.values()], (assess as string[] | undefined) ?? [], (baseline as string | undefined) ?? null, settings);
  return { flags: flags.map(({ on, rule }) => [on, rule]) };
}

function cutoffs({ mean_dominant, mean_nondominant, sd }: Inputs) {
  const dominant = num(mean_dominant);
  const other = (mean_nondominant as number | undefined) ?? 1 / dominant;
  const at = (mean: number, k: number): number => cutoffFromNorm({ mean, sd: num(sd), k });
  return {
    cut_3sd_dominant: at(dominant, 3),
    cut_3sd_nondominant: at(other, 3),
    cut_3sd_nondominant_mean_0_964: at(0.964, 3),
    cut_2sd_dominant: at(dominant, 2),
    cut_2sd_nondominant: at(other, 2),
    reciprocal_of_mean: 1 / dominant,
  };
}

const identityBy = (method: unknown): MethodIdentity => ({ method: method as MeasurementMethodCode, map: null, deviceId: null, formulaVersion: '1' });

/** One handler per kind: from the entry's inputs to the numbers our own functions give. */
export const handlers: Readonly<Record<string, Handler>> = {
  abs_vs_relative: ({ delta_ml, min_baseline_ml, max_baseline_ml }) => {
    const share = (baseline: unknown): number => changePct({ before: num(baseline), now: num(baseline) + num(delta_ml) });
    return { rel_pct_small: share(min_baseline_ml), rel_pct_large: share(max_baseline_ml), published_range_pct: [share(max_baseline_ml), share(min_baseline_ml)] };
  },
  adherence: ({ weeks, sessions_per_week, done }) => {
    const prescribed = num(weeks) * num(sessions_per_week);
    const pct = adherencePct({ done: num(done), prescribed });
    return { prescribed, adherence_pct: pct, ge75: isAtLeast(pct ?? 0, 75) };
  },
  bioimpedance_cutoff_from_mean_sd: cutoffs,
  bioimpedance_norm: ({ mean, sd }) => ({ cut_2sd: cutoffFromNorm({ mean: num(mean), sd: num(sd), k: 2 }), cut_3sd: cutoffFromNorm({ mean: num(mean), sd: num(sd), k: 3 }) }),
  bioimpedance_ratio: ({ r0_at_risk_ohm, r0_unaffected_ohm, at_risk_is_dominant }) => {
    const ratio = impedanceRatio({ atRiskOhm: num(r0_at_risk_ohm), unaffectedOhm: num(r0_unaffected_ohm) });
    const dominant = at_risk_is_dominant as boolean;
    return {
      ratio,
      cutoff_2001: impedanceCutoff('2001-3sd', dominant),
      above_2001: isAboveCutoff(ratio, '2001-3sd', dominant),
      cutoff_2011: impedanceCutoff('2011-3sd', dominant),
      above_2011: isAboveCutoff(ratio, '2011-3sd', dominant),
    };
  },
  bmi: ({ weight_kg, height_cm }) => {
    const value = bmi({ weightKg: num(weight_kg), heightCm: num(height_cm) });
    return { bmi: value, ge30: isAtLeast(value, 30) };
  },
  calendar_months: ({ anchor, months }) => ({ target: addMonths(text(anchor), num(months)) }),
  case_definitions_timeline: caseTimeline,
  contralateral_drift: ({ U1_ml, U2_ml }) => {
    const pair = { before: num(U1_ml), now: num(U2_ml) };
    return { change_pct: changePct(pair), flag_soft: unaffectedChange.range.run(pair) !== null };
  },
  ctcae_edema_limbs_grade_by_size: ({ interlimb_discrepancy_pct }) => ({ grade: ctcaeGradeBySize(num(interlimb_discrepancy_pct)) }),
  date_order: ({ surgery, baseline_measure, first_session }) => ({
    flags: dateOrderFlags({ bornOn: null, diagnosedOn: null, diedOn: null, surgeryOn: text(surgery), baselineOn: text(baseline_measure), firstSessionOn: text(first_session) }),
  }),
  deload_two_weeks_per_week: ({ weekly_loads_kg, weeks_missed }) => ({ resume_kg: resumeTwoWeeksPerWeek({ weeklyLoadsKg: list(weekly_loads_kg), weeksMissed: num(weeks_missed) }) }),
  deload_window: ({ pre_break_kg, increment_kg }, expected) => {
    const preBreakKg = num(pre_break_kg);
    const settings = { ...defaultTrainingSettings, incrementKg: (increment_kg as number | undefined) ?? defaultTrainingSettings.incrementKg };
    const { fromKg, toKg, isFeasible } = resumeWindow(preBreakKg, settings);
    const at = (on: string, loadKg: number): TrainingSession => ({ id: on, on, armChanged: false, entries: [{ exercise: 'row', equipment: 'dumbbell', basis: 'per hand', side: 'both', sets: [{ reps: 10, loadKg }] }] });
    const resumed = judgeSessions([at('2024-03-25', preBreakKg), at('2024-04-22', preBreakKg)], [], '2024-01-02', settings);
    const isDeviation = resumed.some(({ rule }) => rule === 'RESUME_HIGH');
    // The action in words: no deviation is raised for the old load where no step fits.
    return { min_kg: fromKg, max_kg: toKg, feasible_on_increment: isFeasible, action: !isFeasible && !isDeviation ? expected.action : `deviation ${String(isDeviation)}` };
  },
  device_switch: ({ baseline_method, visit_method }) => {
    const answer = areComparable(identityBy(baseline_method), identityBy(visit_method));
    return { rvc_computed: answer.comparable, flags: answer.comparable ? [] : [answer.flag] };
  },
  digit_preference: ({ terminal_digit_counts }) => {
    const { n, chi2, df, p, share0or5, isSuspect } = digitPreference(list(terminal_digit_counts));
    return { n, chi2, df, p, share_0_or_5: share0or5, flag: isSuspect };
  },
  disability_30_item: ({ items }) => ({ score: scoreScale(items as (number | null)[], { min: 1, max: 5, direction: 'as items', missingRule: { maxMissing: 3 } }).value }),
  dominance_offset: () => ({ expected_unadjusted_interlimb_pct_when_dominant_at_risk: DOMINANT_ARM_EXCESS_PCT }),
  dominance_prediction_limits: ({ interlimb_pct, at_risk_is_dominant }) => ({ category: dominanceCategory({ interLimbPct: num(interlimb_pct), atRiskIsDominant: at_risk_is_dominant as boolean }) }),
  early_exclusion: earlyExclusion,
  hand_volume_frustum: ({ circumferences_cm, lengths_cm }) => {
    const result = limbVolume({ method: 'hand-frustum', girthsMm: toMm(list(circumferences_cm)), lengthsMm: toMm(list(lengths_cm)) });
    return { segments_ml: result.segmentsMl, hand_ml: result.volumeMl };
  },
  isl_severity: ({ excess_volume_pct }) => ({ severity: islSeverity(num(excess_volume_pct)) }),
  left_right_swap: ({ prev_left, prev_right, cur_left, cur_right }) => {
    const mm = (value: unknown): number[] => list(value).map((cm) => Math.round(cm * 10));
    const { asEnteredCm2, swappedCm2, rmsCm, isSuspect } = leftRightSwap({ previousLeftMm: mm(prev_left), previousRightMm: mm(prev_right), leftMm: mm(cur_left), rightMm: mm(cur_right) });
    return { sse_as_entered: asEnteredCm2, sse_swapped: swappedCm2, rms_as_entered: rmsCm, suspect: isSuspect };
  },
  length_to_cm: ({ value }) => ({ cm: inchesToCm(num(value)) }),
  limb_volume_disk: ({ circumferences_cm, segment_cm }) => ({ volume_ml: volume('disk', list(circumferences_cm), num(segment_cm)) }),
  limb_volume_error_propagation: ({ circumferences_cm, segment_cm, add_cm }) => deltaFrom(volume('frustum', list(circumferences_cm).map((cm) => cm + num(add_cm)), num(segment_cm))),
  limb_volume_frustum: frustumVolume,
  limb_volume_interval_bias: curvedLimb,
  limb_volume_mean_cylinder: ({ circumferences_cm, segment_cm }) => {
    const volumeMl = volume('mean-cylinder', list(circumferences_cm), num(segment_cm));
    return { volume_ml: volumeMl, frustum_minus_this_ml: volume('frustum', list(circumferences_cm), num(segment_cm)) - volumeMl };
  },
  limb_volume_offset: shiftedStart,
  limb_volume_single_error: ({ circumferences_cm, segment_cm, index, typo_value_cm }) => deltaFrom(volume('frustum', list(circumferences_cm).with(num(index), num(typo_value_cm)), num(segment_cm))),
  limb_volume_taper: taperedVolume,
  linear_0_100: ({ items, min, max, type }) => ({
    score: scoreScale(items as (number | null)[], { min: num(min), max: num(max), direction: type === 'functional' ? 'turned' : 'as items', missingRule: { atLeast: 'half' } }).value,
  }),
  load_rules: loadRules,
  mass_to_kg: ({ value, unit }) => ({ kg: massToKg(num(value), unit as 'kg' | 'lb') }),
  numeric_change: ({ before, after, mid, mdc90, higher_is_worse }) => {
    const result = changeOfScore({ before: num(before), after: num(after), mid: num(mid), mdc: num(mdc90), highIsWorse: higher_is_worse as boolean });
    return { change: result.change, exceeds_mid: result.exceedsMid, exceeds_mdc: result.exceedsMdc, direction: result.direction };
  },
  one_rm: ({ load_kg, reps }) => {
    const [loadKg, r] = [num(load_kg), num(reps)];
    const { epleyKg, brzyckiKg, isReliable } = oneRepMax({ loadKg, reps: r });
    // The raw Epley and the decimal Brzycki are variants the registry does not show.
    return { epley: epleyKg, epley_raw: loadKg * (1 + r / 30), brzycki: brzyckiKg, brzycki_decimal: loadKg / (1.0278 - 0.0278 * r), reliable: isReliable };
  },
  relative_dose: ({ done_volume_load_kg, prescribed_volume_load_kg }) => ({ relative_dose_pct: relativeDosePct({ doneKg: list(done_volume_load_kg), prescribedKg: list(prescribed_volume_load_kg) }) }),
  relative_volume_change: relativeChange,
  repeat_disagreement: ({ first_cm, second_cm, third_cm, limit_cm }) => {
    const mm = (cm: unknown): number | null => (cm === null ? null : Math.round(num(cm) * 10));
    const { thirdNeeded, girthMm } = combineTrials({ first: mm(first_cm), second: mm(second_cm), third: mm(third_cm) }, num(limit_cm) * 10);
    return { third_needed: thirdNeeded, value_cm: girthMm === null ? null : girthMm / 10 };
  },
  session_rpe: ({ cr10, minutes }) => ({ session_load_au: sessionLoad({ effort: num(cr10), minutes: num(minutes) }) }),
  sustained_definition: ({ rvc_pct_by_visit, threshold }) => {
    const timeline = list(rvc_pct_by_visit).map((pct, day) => ({ day, scheduled: true, verdict: isAtLeast(pct, num(threshold)) ? ('met' as const) : ('not met' as const) }));
    return { first_any_index: firstOccurrence(timeline)?.index ?? null, first_sustained_index: sustained(timeline)?.index ?? null };
  },
  taper: ({ circumferences_cm, max_drop_cm, max_rise_cm }) => {
    const girthsMm = list(circumferences_cm).map((cm) => Math.round(cm * 10));
    const found = taperViolations(girthsMm, { maxDropMm: num(max_drop_cm) * 10, maxRiseMm: num(max_rise_cm) * 10 });
    return { violations: found.map(({ level, changeMm }) => [level, changeMm / 10]) };
  },
  unit_confusion: ({ entered_circumference }) => {
    const reading = { girthMm: Math.round(num(entered_circumference) * 10), offsetMm: 320 };
    const finding = girthLimit.run(reading);
    const inchesCm = girthIfInchesCm(reading);
    return { flag: finding?.message.includes('under the limit') ? 'BELOW_HARD_RANGE' : null, if_inches_cm: inchesCm, suggest_unit_error: inchesCm !== null };
  },
  visit_window: ({ anchor_date, offset_days, actual, before, after }) => {
    const window = visitWindow({ anchorOn: text(anchor_date), offsetDays: num(offset_days), beforeDays: num(before), afterDays: num(after) });
    const { status, deltaDays } = placeInWindow(window, text(actual));
    return { target: window.targetOn, delta_days: deltaDays, status: status === 'in' ? 'in' : 'out' };
  },
  volume_load: ({ sets, bilateral_per_hand }) => {
    const inKg = (sets as { reps: number; load_kg?: number; load_lb?: number }[]).map(({ reps, load_kg, load_lb }) => ({ reps, loadKg: load_kg ?? massToKg(load_lb ?? Number.NaN, 'lb') }));
    const perHand = volumeLoad(inKg);
    return { volume_load_kg: bilateral_per_hand ? volumeLoad(inKg, 2).volumeLoadKg : perHand.volumeLoadKg, per_hand_kg: perHand.volumeLoadKg, total_reps: perHand.totalReps };
  },
  weekly_progression: ({ week_loads_kg }) => {
    const { slopeKgPerWeek, totalChangeKg, changePct: pct, weeksWithRaise, maxStepKg } = weeklyProgression(list(week_loads_kg));
    return { slope_kg_per_week: slopeKgPerWeek, total_change_kg: totalChangeKg, pct_change: pct, weeks_with_raise: weeksWithRaise, max_step_kg: maxStepKg };
  },
  weight_adjusted_change: ({ A1_ml, W1_kg, A2_ml, W2_kg }) => {
    const wac = weightAdjustedChange({ baselineMl: num(A1_ml), baselineWeightKg: num(W1_kg), volumeMl: num(A2_ml), weightKg: num(W2_kg) });
    return { wac, wac_pct: wac * 100, ge5: isAtLeast(wac, 0.05), ge10: isAtLeast(wac, 0.1) };
  },
  window_overlap: ({ targets_days, half_widths }) => {
    const widths = list(half_widths);
    const { gapsDays, overlap } = windowGaps(list(targets_days).map((offsetDays, i) => ({ offsetDays, beforeDays: widths[i] ?? 0, afterDays: widths[i] ?? 0 })));
    return { overlap, gaps_days: gapsDays };
  },
};
