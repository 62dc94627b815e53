import { createHash } from 'node:crypto';
import type { ConsentForm } from '@/lib/protocol/document';

/** What a signature binds to. */
export interface SignedContent {
  readonly formNumber: string;
  readonly form: ConsentForm;
  readonly permissions: Readonly<Record<string, 'yes' | 'no'>>;
}

/** JSON with the keys of every object in order, so that one content has one text however it was stored. */
function canonical(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const entries = Object.entries(value)
    .filter(([, member]) => member !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${entries.map(([key, member]) => `${JSON.stringify(key)}:${canonical(member)}`).join(',')}}`;
}

/** SHA-256 over the words that were read and agreed to, and the answer to every permission. */
export const contentHash = ({ formNumber, form, permissions }: SignedContent): string =>
  createHash('sha256').update(canonical({ formNumber, form, permissions })).digest('hex');
