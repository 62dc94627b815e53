import type { Metadata } from 'next';
import { PeopleTable } from '@/components/people/people-table';
import { PageHead } from '@/components/ui/page';
import { listPeople } from '@/lib/people/list-people';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'People' };

export default async function PeoplePage() {
  const people = await loadPage('people.list', listPeople);
  return (
    <>
      <PageHead title="People" lede={`${people.length} roles. By-lines everywhere show these codes; names and addresses stand with the sign-in and are shown to nobody else.`} />
      <div className="mt-6">
        <PeopleTable people={people} />
      </div>
    </>
  );
}
