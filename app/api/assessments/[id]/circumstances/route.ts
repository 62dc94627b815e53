import { saveCircumstancesInput } from '@/lib/measurement/input';
import { saveCircumstances } from '@/lib/measurement/save-circumstances';
import { route } from '@/lib/web/route';

export const PUT = route({ act: 'assessment.save-trial', summary: 'Save position, sleeve, weight and ratio', input: saveCircumstancesInput, change: true, run: saveCircumstances });
