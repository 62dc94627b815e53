import { expect, test } from 'vitest';
import { may, policy, ruleOf, type Act } from '@/lib/auth/policy';
import { grantedRoles } from '@/lib/auth/roles';

const acts = Object.keys(policy).sort() as Act[];

test('the matrix of acts and roles is what was agreed', () => {
  // A change of permission is one line of this snapshot's diff, and a reviewer's decision.
  const lines = acts.map((act) => `${act} [${ruleOf(act).kind}${ruleOf(act).identity ? `, identity ${ruleOf(act).identity}` : ''}]: ${ruleOf(act).roles.join(', ')}`);
  expect(lines.join('\n')).toMatchSnapshot();
});

test('a monitor changes no data', () => {
  const writes = acts.filter((act) => may('monitor', act) && ruleOf(act).kind === 'write');
  expect(writes.filter((act) => !/^(query|verification)\./.test(act))).toEqual([]);
});

test('identity opens for the own site and the person only', () => {
  const open = grantedRoles.filter((role) => acts.some((act) => may(role, act) && ruleOf(act).identity === 'on'));
  expect(open.sort()).toEqual(['participant', 'site-coordinator', 'site-investigator']);
});

test('nobody but the system opens the sign-in door', () => {
  const doors = acts.filter((act) => ruleOf(act).identity === 'sign-in');
  expect(doors.flatMap((act) => [...ruleOf(act).roles])).toEqual(doors.map(() => 'system'));
});

test('an administrator sees no health data', () => {
  const seen = acts.filter((act) => may('administrator', act));
  expect(seen.filter((act) => !/^(people|protocol|shell)\./.test(act))).toEqual([]);
});

test('an auditor only reads, but for the downloaded trail, which is itself an act', () => {
  expect(acts.filter((act) => may('auditor', act) && ruleOf(act).kind === 'write')).toEqual(['audit.export']);
});

test('an act is a noun and a verb', () => {
  expect(acts.filter((act) => !/^[a-z]+\.[a-z-]+$/.test(act))).toEqual([]);
});
