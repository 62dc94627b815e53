import { z } from 'zod';
import { correctIdentity } from '@/lib/enrolment/correct-identity';
import { correctIdentityInput } from '@/lib/enrolment/input';
import { viewIdentity } from '@/lib/enrolment/view-identity';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'identity.view', summary: 'Read name and contact', input: z.strictObject({ id: z.uuid() }), run: viewIdentity });
export const PUT = route({ act: 'identity.correct', summary: 'Correct name and contact', input: correctIdentityInput, change: true, run: correctIdentity });
