import { expect, it } from 'vitest';
import { withWork } from '@/lib/work/with-work';
import { givenParticipant, givenScene, givenStaff } from '../given';

it('a scene gives a participant whose own site sees the record and whose other site does not', async () => {
  const { site, protocol, coordinator, otherCoordinator } = await givenScene();
  const participant = await givenParticipant(site, protocol, coordinator);
  const monitor = await givenStaff('monitor', site);
  const seen = (actor: typeof coordinator) =>
    withWork(actor, 'participant.list', (work) => work.sql<{ code: string }>('select code from participant where id = ?', [participant.id]));
  expect(await seen(coordinator)).toEqual([{ code: participant.code }]);
  expect(await seen(monitor)).toEqual([{ code: participant.code }]);
  expect(await seen(otherCoordinator)).toEqual([]);
  expect(Object.keys(participant.visits)).toEqual(['baseline', 'week-12', 'month-6']);
});
