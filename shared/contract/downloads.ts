import * as z from 'zod/mini';

/** How a CSV file writes its figures: with a point between commas, or with a decimal comma between semicolons. */
export const csvQuery = z.object({ decimal: z._default(z.enum(['point', 'comma']), 'point') });
export type CsvQuery = z.output<typeof csvQuery>;

/** The decimal mark that a query asks for. */
export const markOf = ({ decimal }: CsvQuery): '.' | ',' => (decimal === 'comma' ? ',' : '.');
