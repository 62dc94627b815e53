import { checkArm } from '@/lib/safety/check-arm';
import { checkArmInput } from '@/lib/safety/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'symptom.report', summary: 'Send the arm check that comes before training', input: checkArmInput, create: true, run: checkArm });
