import { hash, verify } from '@node-rs/argon2';
import { z } from 'zod';

/**
 * Passwords after NIST SP 800-63B: length counts, composition does not, known ones are refused, none expires by age.
 * Parameters of argon2id after RFC 9106, second recommended option (64 MiB, three passes), with one lane.
 */
// The package's enum is ambient, which isolated modules cannot read; its value for argon2id is 2.
const argon2id = 2;
const options = { algorithm: argon2id, memoryCost: 65_536, timeCost: 3, parallelism: 1 };

/** Passwords and stems that guessing tries first; common practice, no source. */
const known = ['password', 'passwort', 'qwerty', 'letmein', 'welcome', 'iloveyou', '123456', 'abcdef', 'tidemark', 'steadylift', 'steady lift'];

const isGuessable = (password: string): boolean => {
  const plain = password.toLowerCase().replace(/[^a-z]/g, '');
  const repeats = new Set(password).size < 5;
  return repeats || known.some((stem) => plain === stem || password.toLowerCase() === stem || plain === stem + stem);
};

/** The one rule for a new password, asked at the edge of client and server. */
export const newPassword = z
  .string()
  .min(12, 'Use at least 12 characters; a few words in a row are easy to remember.')
  .max(256, 'Use at most 256 characters.')
  .refine((value) => !isGuessable(value), 'That password is easy to guess. Use a few unrelated words.');

export const hashPassword = (password: string): Promise<string> => hash(password.normalize('NFKC'), options);

// Compared when no account answers to the address, so that the answer takes as long.
let decoy: Promise<string> | undefined;

/** Whether the password is the right one. Takes the same time when there is none to compare with. */
export async function isPassword(stored: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('an account that does not exist');
  const right = await verify(stored ?? (await decoy), password.normalize('NFKC'));
  return stored !== null && right;
}
