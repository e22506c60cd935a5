import * as z from 'zod/mini';
import { invalidInput } from '#server/errors/app-error.ts';

type Schema = z.core.$ZodType;

/** Parses the parts of a request, collecting the faults of all of them before it throws. */
export function parseInput(
  schemas: { params: Schema | undefined; query: Schema | undefined; body: Schema | undefined },
  parts: { params: unknown; query: unknown; body: unknown },
): { params: unknown; query: unknown; body: unknown } {
  const errors: Array<{ path: string; message: string }> = [];
  const parse = (schema: Schema | undefined, value: unknown) => {
    if (!schema) return undefined;
    const result = z.safeParse(schema, value);
    if (result.success) return result.data;
    for (const issue of result.error.issues)
      errors.push({ path: issue.path.map(String).join('.'), message: issue.message });
    return undefined;
  };
  const parsed = {
    params: parse(schemas.params, parts.params),
    query: parse(schemas.query, parts.query),
    body: parse(schemas.body, parts.body ?? {}),
  };
  if (errors.length > 0) throw invalidInput(errors);
  return parsed;
}
