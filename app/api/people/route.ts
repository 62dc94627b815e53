import { z } from 'zod';
import { listPeople } from '@/lib/people/list-people';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'people.list', summary: 'List accounts with their roles', input: z.strictObject({}), run: listPeople });
