import type { WorkGroupKey } from './work-groups';

/** What every piece of work has. Days are the site's own; moments are ISO strings. */
export interface WorkCommon {
  readonly id: string;
  /** An urgent report stands above the list, outside its groups. */
  readonly group: WorkGroupKey | 'urgent';
  /** The day it is due, and the site's today beside it. */
  readonly dueOn: string;
  readonly today: string;
  readonly timeZone: string;
  readonly siteName: string;
  /** Participant code, or the number of the screening. */
  readonly code: string;
}

/**
 * One kind of work on Today: where it is found and what its rows say. Both pieces of SQL may read `site_day` (each site
 * in reach with its own today, see site-day.ts) and take no values of their own. Where a table is large, its rows are
 * found site by site in a lateral with `offset 0`: the planner cannot guess how many rows the reach leaves, and would
 * otherwise start from every participant.
 */
export interface WorkKind<Item extends WorkCommon & { readonly kind: string }, Row extends { readonly id: string }> {
  readonly kind: Item['kind'];
  /**
   * All work of this kind, as id, site_id, code, due_on, at (the moment that orders a day, or null), tie (orders what is
   * otherwise equal) and standing: 'urgent' or 'late' where the due day alone does not tell, else null.
   */
  readonly keys: string;
  /** What the rows say beyond their keys, for the ids in `asked`; each with its id. */
  readonly details: string;
  item(row: Row, common: WorkCommon): Item;
}

/** Types one kind of work; kinds/index.ts lists them. */
export const defineWorkKind = <Item extends WorkCommon & { readonly kind: string }, Row extends { readonly id: string }>(kind: WorkKind<Item, Row>): WorkKind<Item, Row> => kind;

/** Who still comes to visits and answers: in the study, or out of it but for the training alone. Reads `p`. */
export const stillFollowed = `(p.state = 'enrolled' or p.left_grade = 'stops training')`;
