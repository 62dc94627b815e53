import { hash, verify } from '@node-rs/argon2';

/**
 * Passwords after NIST SP 800-63B: length counts, composition does not, known ones are refused, none expires by age.
 * Parameters of argon2id: 19 MiB, two passes, one lane (OWASP Password Storage Cheat Sheet; value from memory).
 */
// The package's enum is ambient, which isolated modules cannot read; its value for argon2id is 2.
const argon2id = 2;
const options = { algorithm: argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export const hashPassword = (password: string): Promise<string> => hash(password.normalize('NFKC'), options);

// Compared when no account answers to the address, so that the answer takes as long.
let decoy: Promise<string> | undefined;

/** Whether the password is the right one. Takes the same time when there is none to compare with. */
export async function isPassword(stored: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('an account that does not exist');
  const right = await verify(stored ?? (await decoy), password.normalize('NFKC'));
  return stored !== null && right;
}
