import * as z from 'zod/mini';
import { id, pageQuery, timestamp } from './common.ts';
import { csvQuery } from './downloads.ts';

/** What an event can be about. */
export const eventAbout = z.enum(['drawings', 'nets', 'notes', 'checking', 'dam']);
export type EventAbout = z.infer<typeof eventAbout>;

/** Which events are asked for: whose, about what, from a time on and before a time. */
const filter = {
  person: z.optional(id),
  about: z.optional(eventAbout),
  from: z.optional(timestamp),
  until: z.optional(timestamp),
};
export const eventFilter = z.object(filter);
export type EventFilter = z.output<typeof eventFilter>;

export const eventListQuery = z.extend(pageQuery, filter);
/** The file holds what the list shows. */
export const eventFileQuery = z.extend(csvQuery, filter);
