import { confirmEligibility } from '@/lib/enrolment/confirm-eligibility';
import { confirmEligibilityInput } from '@/lib/enrolment/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'screening.confirm', summary: 'Confirm eligibility', input: confirmEligibilityInput, change: true, run: confirmEligibility });
