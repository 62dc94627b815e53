import { flagIdInput } from '@/lib/training/input';
import { seeFlag } from '@/lib/training/list-flags';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'flag.see', summary: 'Mark a training flag as seen', input: flagIdInput, run: seeFlag });
