import type { Metadata } from 'next';
import { PickedOut } from '@/components/extracts/picked-out';
import { ProfileSentence, RequestForm } from '@/components/extracts/request-form';
import { VariablesTable } from '@/components/extracts/variables-table';
import { Columns, MarginPart, PageHead } from '@/components/ui/page';
import { previewExtractInput } from '@/lib/extracts/input';
import { previewExtract } from '@/lib/extracts/preview-extract';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Ask for an extract' };

export default async function AskForExtractPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const asked = previewExtractInput.safeParse(await searchParams);
  const { profile } = asked.success ? asked.data : previewExtractInput.parse({});
  const { people, disclosure, groups, files } = await loadPage('extract.preview', (work) => previewExtract(work, { profile }));
  return (
    <>
      <PageHead title="Ask for an extract" crumbs={[{ label: 'Extracts', href: '/extracts' }, { label: 'ask' }]} lede={<ProfileSentence profile={profile} people={people.included} />} />
      <Columns
        marginLabel="About this profile"
        margin={
          <>
            <MarginPart title="Who would be in it">
              <p className="t-small mt-1.5">
                {people.included} of {people.enrolled} enrolled. {people.saidNo} said no to sharing, {people.notAsked} were not asked; they stay out. {people.cutShort} asked for no further data and are in it until their day.
              </p>
            </MarginPart>
            <MarginPart title="The two profiles">
              <p className="t-small mt-1.5 text-ink-2">Open: study days, wide bands, no site. Controlled: study days, narrow bands, the site as a random number; for somebody who has signed an agreement on the use of the data.</p>
            </MarginPart>
            <MarginPart title="Days, not dates">
              <p className="t-small mt-1.5 text-ink-2">Every date becomes days from that person’s enrolment; the day of surgery becomes a band. The random number of a person is kept nowhere.</p>
            </MarginPart>
            <PickedOut disclosure={disclosure} isDone={false} />
            <MarginPart title="Files">
              <ul className="t-small mt-1.5 text-ink-2">
                {files.map(({ name, about, columns }) => (
                  <li key={name} className="mb-1">
                    <b>{name}</b>, {columns} columns. {about}.
                  </li>
                ))}
                <li>
                  <b>codebook</b> and <b>checksums</b>
                </li>
              </ul>
            </MarginPart>
          </>
        }
      >
        <h2>What it is for</h2>
        <RequestForm profile={profile} />
        <h2 className="mt-10 mb-2">Variables, and what is done to each</h2>
        <VariablesTable groups={groups} />
      </Columns>
    </>
  );
}
