import { saveTrialInput } from '@/lib/measurement/input';
import { saveTrial } from '@/lib/measurement/save-trial';
import { route } from '@/lib/web/route';

export const PUT = route({ act: 'assessment.save-trial', summary: 'Save one pass of the tape over one arm', input: saveTrialInput, change: true, run: saveTrial });
