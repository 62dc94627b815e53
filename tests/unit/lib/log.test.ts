import { expect, it } from 'vitest';
import { describeError, makeLog } from '@/lib/log';

function logged(write: (log: ReturnType<typeof makeLog>) => void): string {
  let text = '';
  write(makeLog('info', { write: (line) => void (text += line) }));
  return text;
}

it('personal data and secrets are cut from what is logged, also one level down', () => {
  const text = logged((log) => log.info({ email: 'ada@home.example', person: { name: 'Ada', phone: '123' }, token: 'abc', job: 'mail.send' }, 'done'));
  expect(text).not.toMatch(/ada|Ada|123|abc/);
  expect(JSON.parse(text)).toMatchObject({ job: 'mail.send', msg: 'done', email: '[cut]', person: { name: '[cut]' } });
});

it('an error is logged by kind, code and place, because its message may hold the values of a statement', () => {
  const error = Object.assign(new TypeError("insert into identity values ('Ada')"), { code: '23505', detail: 'Key (email)=(ada@home.example)' });
  const text = logged((log) => log.error({ err: error }, 'failed'));
  expect(text).not.toMatch(/Ada|ada@/);
  expect(JSON.parse(text)).toMatchObject({ err: { kind: 'TypeError', code: '23505' } });
  expect(describeError('text')).toEqual({ kind: 'string' });
});
