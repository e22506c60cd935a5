import * as z from 'zod/mini';
import { invalidInput } from '#server/errors/app-error.ts';

/** Where a page of a list ends: time to the microsecond as the database writes it, and the id for equal times. */
const position = z.object({
  at: z.string().check(z.regex(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{6}Z$/)),
  id: z.uuid(),
});
export type Position = z.output<typeof position>;

/** SQL that writes a timestamptz column as a position wants it; a JavaScript date would drop the microseconds. */
export const positionTime = (column: string) =>
  `to_char(${column} AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')`;

export const toCursor = ({ at, id }: Position) => Buffer.from(JSON.stringify([at, id])).toString('base64url');

/** @throws AppError invalid-input for a cursor this server did not make */
export function fromCursor(cursor: string): Position {
  try {
    const [at, id] = JSON.parse(Buffer.from(cursor, 'base64url').toString());
    return z.parse(position, { at, id });
  } catch {
    throw invalidInput([
      { path: 'cursor', message: 'this is no cursor of the list; start from its beginning' },
    ]);
  }
}
