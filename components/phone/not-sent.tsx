import type { ProblemDetails } from '../api/send';
import { ErrorSummary } from '../ui/error-summary';

/** What stands in the way of sending, and that nothing typed is lost. */
export function NotSent({ problem }: { problem: ProblemDetails | null }) {
  if (!problem) return null;
  const offline = problem.code === 'no-connection';
  const sentence = offline ? 'Not saved, no connection. Kept on this page; we try again every 30 seconds. Do not close the page.' : problem.detail;
  const more = offline ? [] : (problem.fields ?? []).map(({ sentence: words }) => words).filter((words) => words !== sentence);
  return <ErrorSummary title={offline ? 'Waiting for the line' : 'Not saved'} problems={[sentence, ...more].map((words) => ({ sentence: words }))} />;
}
