import { zodResolver } from '@hookform/resolvers/zod';
import type { FieldValues, Resolver } from 'react-hook-form';
import type { z } from 'zod';

/**
 * Checks a form with the schema the server uses, and hands on what was typed, not what the schema made of it: the
 * server parses once more, and a height read into millimetres must not be read twice.
 */
export function rawResolver<Typed extends FieldValues>(schema: z.ZodType<unknown, FieldValues>): Resolver<Typed> {
  // An empty choice is a value of the form and not of the schema, so the two types differ on purpose.
  return zodResolver(schema, undefined, { raw: true }) as unknown as Resolver<Typed>;
}
