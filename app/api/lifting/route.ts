import { z } from 'zod';
import { viewLifting } from '@/lib/training/view-lifting';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'lifting.view', summary: 'Show what the participant who is signed in has lifted', input: z.strictObject({}), run: viewLifting });
