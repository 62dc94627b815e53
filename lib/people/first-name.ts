/** How a letter greets: the first word of the name. */
export const firstName = (name: string): string => name.trim().split(/\s+/)[0]?.slice(0, 80) ?? '';
