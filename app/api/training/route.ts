import { z } from 'zod';
import { logSession } from '@/lib/safety/log-session';
import { logSessionInput } from '@/lib/training/input';
import { viewLog } from '@/lib/training/view-log';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'lifting.view', summary: 'Show the training record that a session is logged against', input: z.strictObject({}), run: viewLog });
export const POST = route({ act: 'training.log', summary: 'Log a training session', input: logSessionInput, create: true, run: logSession });
