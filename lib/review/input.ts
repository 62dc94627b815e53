import { z } from 'zod';
import { fieldTargetInput } from '@/lib/queries/input';

/** Marks and history are asked for one value. */
export const markVerifiedInput = z.strictObject({
  /** Each with the value that was on the screen: a mark never lands on a value that came in between. */
  targets: z.array(fieldTargetInput.extend({ value: z.union([z.string().max(1000), z.number(), z.boolean(), z.null()]) })).min(1).max(60),
});
export const viewHistoryInput = fieldTargetInput;
