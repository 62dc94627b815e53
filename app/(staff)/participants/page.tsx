import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { ParticipantList } from '@/components/participants/participant-list';
import { ButtonLink } from '@/components/ui/button';
import { PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { listParticipantsInput } from '@/lib/participants/input';
import { listChoices } from '@/lib/participants/list-choices';
import { listParticipants } from '@/lib/participants/list-participants';
import { loadPage, requireActor } from '@/lib/web/session';
import { localDate } from '@/lib/work/time';

export const metadata: Metadata = { title: 'Participants' };

export default async function ParticipantsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { q } = await searchParams;
  const found = listParticipantsInput.safeParse({ q: typeof q === 'string' ? q : '' });
  const asked = found.success ? found.data : listParticipantsInput.parse({});
  const { role } = await requireActor('participant.list');
  const { first, choices, today } = await loadPage('participant.list', async (work) => ({
    first: await listParticipants(work, asked),
    choices: await listChoices(work),
    today: localDate(work.now, 'UTC'),
  }));
  const [only] = first.rows;
  // The whole code typed into the find field leads to the page itself.
  if (only && asked.q.toUpperCase() === only.code) redirect(`/participants/${only.code}`);
  return (
    <>
      <PageHead
        title="Participants"
        lede="By code. Names and contact stand on the participant’s page, for the own site only."
        actions={may(role, 'screening.list') ? <ButtonLink href="/screening">Screening log</ButtonLink> : null}
      />
      <ParticipantList first={first} asked={asked} choices={choices} today={today} />
    </>
  );
}
