import { readPartInput } from '@/lib/consent/input';
import { markPartRead } from '@/lib/consent/mark-part-read';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'consent.read-part', summary: 'Mark one part as read', input: readPartInput, run: markPartRead });
