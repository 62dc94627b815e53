/** What a browser may do with an answer that is no page: nothing, should it ever be opened as one. */
export const nothingRuns = "default-src 'none'; frame-ancestors 'none'; sandbox";
