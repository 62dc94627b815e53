import { fieldHistory } from '@/lib/review/field-history';
import { viewHistoryInput } from '@/lib/review/input';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'history.view', summary: 'Show every value a field has held', input: viewHistoryInput, run: fieldHistory });
