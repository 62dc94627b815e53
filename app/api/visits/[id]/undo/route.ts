import { undoBeginInput } from '@/lib/schedule/input';
import { undoBegin } from '@/lib/schedule/undo-begin';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'visit.correct', summary: 'Set a visit that was begun by mistake back to come', input: undoBeginInput, change: true, run: undoBegin });
