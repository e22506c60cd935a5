import type { DamAction, DamRole, GlobalAction } from '#shared/contract/actions.ts';

/** Who asks: an admin of the installation or a member, with the parts on the dam in question. */
export interface DamActor {
  admin: boolean;
  roles: readonly DamRole[];
}

/** The whole rule: which parts on a dam may do what. Admins keep dams and people in order, they do not trace or check. */
const ALLOWED: Record<DamAction, readonly (DamRole | 'admin')[]> = {
  'dam.read': ['engineer', 'reviewer', 'colleague', 'admin'],
  'dam.edit': ['engineer', 'admin'],
  'dam.manageMembers': ['engineer', 'admin'],
  'dam.archive': ['engineer', 'admin'],
  'drawing.upload': ['engineer'],
  'drawing.edit': ['engineer'],
  'drawing.archive': ['engineer'],
  'section.edit': ['engineer'],
  'net.trace': ['engineer'],
  'net.archive': ['engineer'],
  'net.send': ['engineer'],
  'note.write': ['engineer', 'reviewer', 'colleague'],
  'revision.decide': ['reviewer'],
};

const ADMIN_ONLY: Record<GlobalAction, true> = {
  'dam.create': true,
  'people.manage': true,
  'mail.read': true,
};

/** Whether the actor may do `action` on the dam. An actor without any part there may do nothing unless an admin. */
export function allowsOnDam(action: DamAction, actor: DamActor): boolean {
  return ALLOWED[action].some((part) => (part === 'admin' ? actor.admin : actor.roles.includes(part)));
}

/** Everything the actor may do on the dam, for the client to show. */
export function damActionsFor(actor: DamActor): DamAction[] {
  return (Object.keys(ALLOWED) as DamAction[]).filter((action) => allowsOnDam(action, actor));
}

/** Whether a signed-in person may do what needs no dam. */
export function allowsGlobally(action: GlobalAction, person: { admin: boolean }): boolean {
  return ADMIN_ONLY[action] && person.admin;
}

export function globalActionsFor(person: { admin: boolean }): GlobalAction[] {
  return (Object.keys(ADMIN_ONLY) as GlobalAction[]).filter((action) => allowsGlobally(action, person));
}
