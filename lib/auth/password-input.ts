import { z } from 'zod';

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
