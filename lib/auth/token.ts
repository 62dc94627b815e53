import { createHash, randomBytes } from 'node:crypto';

/** A random token of 256 bits for a link or a session. Only its hash is kept. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** SHA-256 in hex: what the data base keeps of a token. */
export const tokenHash = (token: string): string => createHash('sha256').update(token).digest('hex');
