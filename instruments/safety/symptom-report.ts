/**
 * What a participant may report about the arm at any hour. Each is a yes to a plain question; nothing is preset. Groups
 * decide the level; wording is our own.
 */
export const reportedSigns = [
  { code: 'breathless', text: 'Short of breath', group: 'breath' },
  { code: 'chest-pain', text: 'Pain in the chest', group: 'breath' },
  { code: 'confused', text: 'Confused or very drowsy', group: 'very ill' },
  { code: 'fast-breathing', text: 'Breathing fast, or heart racing', group: 'very ill' },
  { code: 'faint', text: 'Fainted, or about to faint', group: 'very ill' },
  { code: 'shaking', text: 'Shaking chills that will not stop', group: 'very ill' },
  { code: 'vomiting', text: 'Being sick', group: 'very ill' },
  { code: 'blue', text: 'Arm or hand blue or dusky', group: 'clot' },
  { code: 'sudden-swelling', text: 'Arm swelled up suddenly, within hours or days', group: 'clot' },
  { code: 'veins', text: 'Veins standing out at the shoulder or chest', group: 'clot' },
  { code: 'fever', text: 'Fever of 38 °C or more', group: 'infection' },
  { code: 'flu-like', text: 'Feeling as if flu were coming, or shivering', group: 'infection' },
  { code: 'hot', text: 'Arm or chest hot to the touch', group: 'infection' },
  { code: 'red', text: 'Red or darker skin, or red streaks', group: 'infection' },
  { code: 'tender', text: 'Skin sore to the touch', group: 'infection' },
  { code: 'lump', text: 'A new lump', group: 'new finding' },
  { code: 'nodules', text: 'New small bumps in the skin', group: 'new finding' },
  { code: 'numb-weak', text: 'New numbness or weakness', group: 'new finding' },
  { code: 'pain-at-rest', text: 'Pain when the arm is at rest, or fast growing swelling', group: 'new finding' },
  { code: 'ache', text: 'Aching', group: 'change' },
  { code: 'full', text: 'Fuller', group: 'change' },
  { code: 'heavy', text: 'Heavier', group: 'change' },
  { code: 'tight', text: 'Tighter', group: 'change' },
  { code: 'tight-wear', text: 'Sleeve, ring or watch fits more tightly', group: 'change' },
  { code: 'visible-swelling', text: 'Swelling I can see', group: 'change' },
] as const;

export type ReportedSign = (typeof reportedSigns)[number]['code'];
export type SignGroup = (typeof reportedSigns)[number]['group'];

/** A symptom report's answers; null = not answered. */
export interface SymptomReportAnswers {
  readonly signs: readonly ReportedSign[];
  /** The change lasted beyond the day of the session, over 24 hours. */
  readonly lastedOverADay: boolean | null;
  /** Sore muscles after training, for how long, and whether only the trained muscles or both sides. */
  readonly soreness: { readonly days: number; readonly onlyTrainedMuscles: boolean } | null;
}
