import * as z from 'zod/mini';

export const unitSystem = z.enum(['SI', 'US']);
export type UnitSystem = z.infer<typeof unitSystem>;
