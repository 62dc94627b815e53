/** Which people of those in reach a figure is about; an absent field leaves nobody out. */
export interface Population {
  readonly cohort?: string | undefined;
  readonly siteId?: string | undefined;
}

/** The condition on a table that has both columns, and its values. */
export const inPopulation = (alias: string, { cohort, siteId }: Population): { where: string; values: (string | null)[] } => ({
  where: `(?::text is null or ${alias}.cohort = ?) and (?::uuid is null or ${alias}.site_id = ?)`,
  values: [cohort ?? null, cohort ?? null, siteId ?? null, siteId ?? null],
});
