import { SymptomReportSchema, type SymptomReport } from '@/entities/symptom-report';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** A report within reach. @throws Refusal 'not-found'. */
export async function findReport(work: Work, id: string): Promise<SymptomReport> {
  const report = await work.em.findOne(SymptomReportSchema, { id });
  if (!report) throw new Refusal('not-found', 'There is no such report in your reach.');
  return report;
}
