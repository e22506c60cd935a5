import * as z from 'zod/mini';

export const id = z.uuid();
/** Time in UTC as ISO 8601. */
export const timestamp = z.iso.datetime();
export const email = z.string().check(z.trim(), z.toLowerCase(), z.maxLength(254), z.email());
export const shortText = z.string().check(z.trim(), z.maxLength(200));
export const requiredText = z.string().check(z.trim(), z.minLength(1), z.maxLength(200));

/** One page of a list and the cursor of the next one; null on the last page. */
export function pageOf<T extends z.core.$ZodType>(item: T) {
  return z.object({ items: z.array(item), nextCursor: z.nullable(z.string()) });
}
export const pageQuery = z.object({ cursor: z.optional(z.string()) });

/** A person as others on the same dam see them. */
export const personRef = z.object({ id, name: z.string() });
export type PersonRef = z.infer<typeof personRef>;
