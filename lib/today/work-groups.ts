/** Where a piece of work stands against today in its site's zone: before it, on it, one to seven days ahead, later. */
export const workGroups = ['late', 'today', 'week', 'later'] as const;
export type WorkGroupKey = (typeof workGroups)[number];

/** Rows of a group on a page. */
export const groupRows = 50;

/** Urgent reports shown above the list; there are never many. */
export const urgentRows = 50;
