import * as z from 'zod/mini';

/** The closed list of problem codes. The client switches on these, never on a text. */
export const problemCode = z.enum([
  'invalid-input',
  'not-signed-in',
  'wrong-credentials',
  'csrf',
  'forbidden',
  'not-found',
  'conflict',
  'already-uploaded',
  'already-exists',
  'token-invalid',
  'too-large',
  'too-many-requests',
  'unsupported-file',
  'refused-file',
  'net-unfinished',
  'own-work',
  'already-decided',
  'figures-kept-back',
  'disk-full',
  'unavailable',
  'internal',
]);
export type ProblemCode = z.infer<typeof problemCode>;

/** RFC 9457 problem details with our own members `code`, `requestId`, `errors` and `extra`. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number(),
  detail: z.string(),
  instance: z.optional(z.string()),
  code: problemCode,
  requestId: z.string(),
  errors: z.optional(z.array(z.object({ path: z.string(), message: z.string() }))),
  /** Facts a client may act on, such as the id of the drawing that holds the same file. */
  extra: z.optional(z.record(z.string(), z.unknown())),
});
export type Problem = z.infer<typeof problem>;
