import { listTrailInput } from '@/lib/audit/input';
import { listTrail } from '@/lib/audit/list-trail';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'audit.list', summary: 'List entries of the audit trail', input: listTrailInput, run: listTrail });
