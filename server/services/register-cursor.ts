import * as z from 'zod/mini';
import { invalidInput } from '#server/errors/app-error.ts';
import type { RegisterSort } from '#shared/contract/register.ts';
import { positionTime } from './cursor.ts';

/** What a list sorted so compares: columns of `register_entry`, as text in the cursor and with their types in SQL. */
interface SortOrder {
  columns: readonly string[];
  /** The columns as the cursor writes them. */
  written: readonly string[];
  casts: readonly string[];
  direction: 'ASC' | 'DESC';
}

export const SORT_ORDERS: Record<RegisterSort, SortOrder> = {
  number: {
    columns: ['e.sort_key', 'e.id'],
    written: ['e.sort_key', 'e.id::text'],
    casts: ['text', 'uuid'],
    direction: 'ASC',
  },
  newest: {
    columns: ['e.at', 'e.id'],
    written: [positionTime('e.at'), 'e.id::text'],
    casts: ['timestamptz', 'uuid'],
    direction: 'DESC',
  },
  dam: {
    columns: ['e.dam_key', 'e.sort_key', 'e.id'],
    written: ['e.dam_key', 'e.sort_key', 'e.id::text'],
    casts: ['text', 'text', 'uuid'],
    direction: 'ASC',
  },
};

const key = z.string().check(z.maxLength(4000), z.regex(/^[^\0]*$/));
const time = z.iso.datetime({ precision: 6 });
const POSITIONS = {
  number: z.tuple([z.literal('number'), key, z.uuid()]),
  newest: z.tuple([z.literal('newest'), time, z.uuid()]),
  dam: z.tuple([z.literal('dam'), key, key, z.uuid()]),
};

export const toRegisterCursor = (sort: RegisterSort, position: readonly string[]) =>
  Buffer.from(JSON.stringify([sort, ...position])).toString('base64url');

/** Where the page before ended. @throws AppError invalid-input for a cursor of another order or of another server */
export function fromRegisterCursor(sort: RegisterSort, cursor: string): string[] {
  try {
    const [, ...position] = z.parse(
      POSITIONS[sort] as z.ZodMiniType<[string, ...string[]]>,
      JSON.parse(Buffer.from(cursor, 'base64url').toString()),
    );
    return position;
  } catch {
    throw invalidInput([
      { path: 'cursor', message: 'this is no cursor of the list in this order; start from its beginning' },
    ]);
  }
}
