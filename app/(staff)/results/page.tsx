import type { Metadata } from 'next';
import { LoadAndRules } from '@/components/results/load-and-rules';
import { PrintButton, ResultsSentence } from '@/components/results/results-sentence';
import { Swelling } from '@/components/results/swelling';
import { WhoIsInIt } from '@/components/results/who-is-in-it';
import { formatMoment } from '@/components/ui/format';
import { PageHead } from '@/components/ui/page';
import { isOffered, viewResultsInput } from '@/lib/results/input';
import { viewResults } from '@/lib/results/view-results';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Results' };

export default async function ResultsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const asked = viewResultsInput.safeParse(await searchParams);
  const view = await loadPage('results.view', (work) => viewResults(work, isOffered(asked.data, work.actor.role) ? asked.data : viewResultsInput.parse({})));
  const { cohorts, sites, definitions, chosen, confirmation, suppressBelow, asOf, protocolNumber } = view;
  const isAsked = asked.success && chosen.cohort === (asked.data.cohort ?? null) && chosen.siteId === (asked.data.siteId ?? null);
  return (
    <>
      <PageHead
        title="Results"
        lede={<ResultsSentence view={{ cohorts, sites, definitions, chosen, confirmation, suppressBelow }} />}
        actions={
          <>
            <p className="border border-ink bg-raised px-3.5 py-2 text-[13.5px] leading-[19px]">
              <b className="block text-[14.5px]">Data as of {formatMoment(new Date(asOf), 'UTC')} UTC</b>
              Protocol {protocolNumber}, computed as the page was opened
            </p>
            <PrintButton />
          </>
        }
      />
      {isAsked ? null : <p className="is-needs mt-3">The address asked for something that is not offered, so the usual choices are shown.</p>}
      <WhoIsInIt view={view} />
      <div className="mt-7 border-t border-rule pt-2">
        <Swelling view={view} />
      </div>
      <div className="mt-7 border-t border-rule pt-2">
        <LoadAndRules view={view} />
      </div>
    </>
  );
}
