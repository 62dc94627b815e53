import { viewResultsInput } from '@/lib/results/input';
import { viewResults } from '@/lib/results/view-results';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'results.view', summary: 'Compute incidence, load progression and adherence', input: viewResultsInput, run: viewResults });
