import { expect, test } from 'vitest';
import { confirmPassword } from '@/lib/auth/confirm-password';
import { hashPassword } from '@/lib/auth/password';
import { asOwner, givenScene } from '../given';

test('a signature takes the right password, and guessing is counted', async () => {
  const { coordinator } = await givenScene();
  await asOwner(`insert into credential (account_id, email, password_hash) values ($1, 'c@tidemark.example', $2)`, [coordinator.accountId, await hashPassword('slack-water-lantern-9')], 'sign-in');
  await expect(confirmPassword(coordinator, 'slack-water-lantern-9')).resolves.toBeUndefined();
  await expect(confirmPassword(coordinator, 'slack water lantern 9')).rejects.toMatchObject({ code: 'invalid', field: 'password' });
  for (let tries = 0; tries < 7; tries += 1) await confirmPassword(coordinator, 'guess').catch(() => undefined);
  await expect(confirmPassword(coordinator, 'slack-water-lantern-9')).rejects.toMatchObject({ code: 'too-many' });
});
