import { z } from 'zod';
import { viewArm } from '@/lib/training/view-arm';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'arm.view', summary: 'Show the arm of the participant who is signed in over time', input: z.strictObject({}), run: viewArm });
