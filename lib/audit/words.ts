/** What was done, by act, in one word or two. An act without an entry is shown as it is written. */
export const didWords: Readonly<Record<string, string>> = {
  'account.join': 'joined',
  'account.sign-in': 'signed in',
  'account.sign-out': 'signed out',
  'session.choose-role': 'chose a role',
  'session.hand-over': 'handed the tablet over',
  'screening.open': 'opened a screening',
  'screening.answer': 'answered a criterion',
  'screening.confirm': 'confirmed eligibility',
  'screening.leave': 'ended the screening',
  'identity.view': 'read name and contact',
  'identity.correct': 'corrected contact',
  'consent.start': 'started consent',
  'consent.read-part': 'read a part',
  'consent.sign': 'signed consent',
  'consent.countersign': 'countersigned',
  'consent.upload': 'took in the paper form',
  'consent.file': 'opened a consent file',
  'consent.send-link': 'sent the consent link',
  'participant.enrol': 'enrolled',
  'participant.invite': 'invited',
  'participant.correct': 'corrected',
  'participant.withdraw': 'withdrew',
  'visit.book': 'booked',
  'visit.begin': 'began',
  'visit.complete': 'completed',
  'visit.miss': 'marked missed',
  'visit.add': 'added',
  'visit.correct': 'corrected',
  'assessment.begin': 'began',
  'assessment.save-trial': 'saved',
  'assessment.complete': 'completed',
  'assessment.correct': 'corrected',
  'query.raise': 'asked',
  'query.answer': 'answered',
  'query.close': 'closed',
  'query.cancel': 'cancelled',
  'query.ask-again': 'asked again',
  'query.remind': 'reminded',
  'verification.mark': 'marked seen',
  'training.log': 'logged training',
  'questionnaire.save': 'saved answers',
  'questionnaire.submit': 'submitted',
  'symptom.report': 'reported',
  'symptom.read': 'read',
  'symptom.review': 'reviewed',
  'flag.see': 'saw the flag',
  'extract.request': 'asked for',
  'extract.download': 'downloaded',
  'audit.export': 'saved the trail',
  'job.mark-missed': 'marked missed',
  'job.write-team': 'wrote to the team',
  'job.extract': 'prepared',
  'demo.seed': 'loaded',
  'study.migrate': 'set up',
};

/** What a table is called. */
export const tableWords: Readonly<Record<string, string>> = {
  account: 'Account',
  consent: 'Consent',
  consent_form_version: 'Consent form',
  consent_signature: 'Consent signature',
  credential: 'Sign-in',
  data_query: 'Query',
  eligibility_answer: 'Eligibility answer',
  extract: 'Extract',
  limb_assessment: 'Limb assessment',
  limb_trial: 'Limb trial',
  participant: 'Participant',
  participant_identity: 'Name and contact',
  protocol_version: 'Protocol version',
  query_message: 'Query message',
  questionnaire_response: 'Questionnaire',
  role_grant: 'Role',
  screening: 'Screening',
  site: 'Site',
  study: 'Study',
  symptom_report: 'Symptom report',
  training_flag: 'Training flag',
  training_session: 'Training session',
  training_set: 'Training set',
  verification: 'Source data verification',
  visit: 'Visit',
};

/** How a value is to be read; screens format by it. */
export type ValueKind = 'text' | 'day' | 'moment' | 'girths' | 'length' | 'weight' | 'volume' | 'change' | 'load' | 'json';

const special: Readonly<Record<string, readonly [string, ValueKind]>> = {
  circumferences_mm: ['girths', 'girths'],
  body_weight_g: ['body weight', 'weight'],
  load_g: ['load', 'load'],
  left_volume_ml: ['left volume', 'volume'],
  right_volume_ml: ['right volume', 'volume'],
  rvc: ['relative volume change', 'change'],
  height_mm: ['height', 'length'],
  handedOver: ['handed over for', 'text'],
  takenBack: ['taken back from', 'text'],
  sha256: ['SHA-256', 'text'],
};

/** The label of a column and how its values are read, from the way columns are named. */
export function fieldWords(column: string): { label: string; kind: ValueKind } {
  const known = special[column];
  if (known) return { label: known[0], kind: known[1] };
  const words = column.replaceAll('_', ' ');
  if (column.endsWith('_on')) return { label: words.replace(/ on$/, ' on'), kind: 'day' };
  if (column.endsWith('_at')) return { label: words, kind: 'moment' };
  if (column.endsWith('_mm')) return { label: words.replace(/ mm$/, ''), kind: 'length' };
  return { label: words, kind: 'text' };
}
