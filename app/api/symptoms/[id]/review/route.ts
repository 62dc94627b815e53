import { reviewReportInput } from '@/lib/safety/input';
import { reviewReport } from '@/lib/safety/review-report';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'symptom.review', summary: 'End the review of a symptom report', input: reviewReportInput, change: true, run: reviewReport });
