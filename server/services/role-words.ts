import type { DamRole } from '#shared/contract/actions.ts';

const ORDER: readonly DamRole[] = ['engineer', 'reviewer', 'colleague'];

/** A set of parts without repeats, in one order everywhere. */
export const orderedRoles = (roles: readonly DamRole[]): DamRole[] =>
  ORDER.filter((role) => roles.includes(role));

/** "engineer", "engineer and reviewer", "engineer, reviewer and colleague". */
export function rolesInWords(roles: readonly DamRole[]): string {
  const words: string[] = orderedRoles(roles);
  const last = words.pop() ?? '';
  return words.length > 0 ? `${words.join(', ')} and ${last}` : last;
}
