import { judgeSymptomReport } from '@/instruments/safety/judge-symptom-report';
import { findOwnRecord } from '@/lib/people/find-own-record';
import { plainDate } from '@/lib/people/plain-date';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import type { ReportSymptomsInput } from './input';
import { findSentReport, keepReport, toSentReport, type SentReport } from './keep-report';

/** A participant reports a change, at any hour. @throws Refusal 'invalid' for a day to come or an empty report, 'locked' after leaving. */
export async function reportSymptoms(work: Work, { clientKey, noticedOn, note: typed, ...answers }: ReportSymptomsInput): Promise<SentReport> {
  const own = await findOwnRecord(work);
  const said = { answers, noticedOn, note: typed || null, clientKey };
  const sent = await findSentReport(work, own, said);
  if (sent) return toSentReport(sent, own);
  if (own.participant.leftGrade === 'no further data')
    throw new Refusal('locked', `You asked that nothing more is recorded. If you feel in danger call your local emergency number; ${own.site.name} is on ${own.site.phone}.`);
  if (noticedOn < own.participant.enrolledOn) throw new Refusal('invalid', `${plainDate(noticedOn)} is before you joined the study on ${plainDate(own.participant.enrolledOn)}. Give the first day since then.`, 'noticedOn');
  if (noticedOn > own.today) throw new Refusal('invalid', `${plainDate(noticedOn)} has not come yet. Give the day on which you noticed it.`, 'noticedOn');
  const verdict = judgeSymptomReport(answers);
  if (!verdict) throw new Refusal('invalid', 'Choose at least one thing that you notice, or say that you are sore.', 'signs');
  return toSentReport(await keepReport(work, own, { verdict, ...said }), own);
}
