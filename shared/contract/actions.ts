import * as z from 'zod/mini';

/** Parts a person may have on a dam, a set. */
export const damRole = z.enum(['engineer', 'reviewer', 'colleague']);
export type DamRole = z.infer<typeof damRole>;

/** Everything on a dam that a rule decides. The server's policy module is the only place that knows the answers. */
export const damAction = z.enum([
  'dam.read',
  'dam.edit',
  'dam.manageMembers',
  'dam.archive',
  'drawing.upload',
  'drawing.edit',
  'drawing.archive',
  'section.edit',
  'net.trace',
  'net.archive',
  'net.send',
  'note.write',
  'revision.decide',
]);
export type DamAction = z.infer<typeof damAction>;

/** What needs no dam. */
export const globalAction = z.enum(['dam.create', 'people.manage', 'mail.read']);
export type GlobalAction = z.infer<typeof globalAction>;
