import { z } from 'zod';
import { fieldTargetInput } from '@/lib/queries/input';

/** Marks and history are asked for one value. */
export const markVerifiedInput = z.strictObject({ targets: z.array(fieldTargetInput).min(1).max(60) });
export const viewHistoryInput = fieldTargetInput;
