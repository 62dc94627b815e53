import { exportTrail, trailCsv } from '@/lib/audit/export-trail';
import { trailFilter } from '@/lib/audit/input';
import { route } from '@/lib/web/route';

export const GET = route({
  act: 'audit.export',
  summary: 'Save the filtered trail as CSV',
  input: trailFilter,
  run: exportTrail,
  respond: (taken) =>
    new Response(trailCsv(taken), {
      headers: { 'content-type': 'text/csv; charset=utf-8', 'content-disposition': 'attachment; filename="audit-trail.csv"', 'cache-control': 'no-store', 'x-content-type-options': 'nosniff' },
    }),
});
