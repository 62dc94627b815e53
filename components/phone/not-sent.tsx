import type { ProblemDetails } from '../api/send';
import { ErrorSummary } from '../ui/error-summary';

const onPhone = 'Not sent yet, no connection: kept on this phone. We try again every 30 seconds while this page is open, and when you open it again.';
const onPage = 'Not saved, no connection. Kept on this page; we try again every 30 seconds. Do not close the page.';

/** What stands in the way of sending, and that nothing typed is lost. `isKept`: the phone has it, so that the page may be closed. */
export function NotSent({ problem, isKept = false }: { problem: ProblemDetails | null; isKept?: boolean }) {
  if (!problem) return null;
  const offline = problem.code === 'no-connection';
  const sentence = offline ? (isKept ? onPhone : onPage) : problem.detail;
  const more = offline ? [] : (problem.fields ?? []).map(({ sentence: words }) => words).filter((words) => words !== sentence);
  return (
    <div className="mb-5">
      <ErrorSummary title={offline ? 'Waiting for the line' : 'Not saved'} problems={[sentence, ...more].map((words) => ({ sentence: words }))} />
    </div>
  );
}
