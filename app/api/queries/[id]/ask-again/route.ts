import { askAgain } from '@/lib/queries/ask-again';
import { askAgainInput } from '@/lib/queries/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'query.ask-again', summary: 'Ask again', input: askAgainInput, change: true, run: askAgain });
