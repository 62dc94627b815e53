/** Accents, capitals and spacing set apart what one hand writes in two ways. */
const plain = (name: string): string => name.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase().replace(/\s+/g, ' ').trim();

/** Whether two spellings are one name: without regard to capitals, spaces and accents. */
export const sameName = (one: string, other: string): boolean => plain(one) === plain(other);
