import type { Work } from '@/lib/work/work';
import type { ExtractDisclosure } from '@/entities/extract';
import { choosePeople, type PeopleCounts } from './choose-people';
import { columnsFor } from './define-extract-file';
import { dictionary, type DataClass, type Entry, type Treatment } from './dictionary';
import { readPeopleSafely } from './disclosure';
import { extractFiles } from './files';
import type { Profile } from './input';

export interface VariableRow {
  readonly key: string;
  readonly words: string;
  readonly class: DataClass;
  readonly treatment: Treatment;
  readonly before: string | null;
  readonly after: string | null;
}

/** What a profile keeps, changes and leaves out, before anything is asked for. */
export interface ExtractPreview {
  readonly profile: Profile;
  readonly people: PeopleCounts;
  /** What the check would withhold now. */
  readonly disclosure: ExtractDisclosure;
  readonly groups: readonly { readonly title: string; readonly rows: readonly VariableRow[] }[];
  readonly files: readonly { readonly name: string; readonly about: string; readonly columns: number }[];
}

const titles: Record<keyof typeof dictionary, string> = {
  participant: 'Who, and the treatment',
  visit: 'Visits',
  limb_assessment: 'Both arms',
  limb_trial: 'Girths',
  questionnaire_response: 'Questionnaires',
  training_session: 'Training sessions',
  training_set: 'What was lifted',
  training_flag: 'Training rules',
  symptom_report: 'Symptom reports',
};

function groupOf(table: keyof typeof dictionary, profile: Profile): ExtractPreview['groups'][number] {
  const columns: Record<string, Entry> = dictionary[table];
  const rows = Object.entries(columns).flatMap(([column, { inner, words, class: dataClass, does, example }]) =>
    inner ? [] : [{ key: `${table}.${column}`, words, class: dataClass, treatment: does[profile], before: example?.[0] ?? null, after: example?.[1][profile] ?? null }],
  );
  return { title: titles[table], rows };
}

/** The dictionary under one profile, and who would be in it now. */
export async function previewExtract(work: Work, { profile }: { profile: Profile }): Promise<ExtractPreview> {
  const { people, counts } = await choosePeople(work);
  const { disclosure } = await readPeopleSafely(work, profile, people);
  return {
    profile,
    people: counts,
    disclosure,
    groups: (Object.keys(dictionary) as (keyof typeof dictionary)[]).map((table) => groupOf(table, profile)),
    files: extractFiles.map((file) => ({ name: file.name, about: file.about, columns: columnsFor(file, profile).length })),
  };
}
