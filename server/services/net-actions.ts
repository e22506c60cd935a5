import type { DamScope } from '#server/http/route-record.ts';
import { damActionsFor } from '#server/policies/dam-policy.ts';
import type { DamAction } from '#shared/contract/actions.ts';
import { type NetPlace, putAwayRefusal } from './net-place.ts';

/** What changes a net or what hangs on it; refused while it, or anything around it, is put away. */
const CHANGES: readonly DamAction[] = [
  'section.edit',
  'net.trace',
  'net.send',
  'note.write',
  'revision.decide',
];

/** What a person may do on this net as it stands, for the desk and the check page to show. */
export function netActionsFor(place: NetPlace, scope: DamScope): DamAction[] {
  const actions = damActionsFor(scope);
  return putAwayRefusal(place) ? actions.filter((action) => !CHANGES.includes(action)) : actions;
}
