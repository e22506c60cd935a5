import { DamEntity, MembershipEntity } from '#server/entities/dam-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { addedToDamMail } from '#server/mail/templates/people-mails.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import { writeEvent } from './event-writer.ts';
import { queueMail } from './mail-service.ts';
import { orderedRoles, rolesInWords } from './role-words.ts';
import type { ServiceDeps } from './service-deps.ts';

/** Who has which parts on a dam. Runs in a transaction of the caller. */
export function createMemberService(deps: ServiceDeps) {
  const { manager, config } = deps;

  async function announce(damId: string, personId: string): Promise<void> {
    await deps.live.publish(manager, { type: 'dam', damId });
    await deps.live.publish(manager, { type: 'person', personId });
  }

  /** Locking the dam keeps two engineers from taking each other's part away at once. */
  async function findDamLocked(damId: string): Promise<DamEntity> {
    const dam = await manager.findOne(DamEntity, {
      where: { id: damId },
      lock: { mode: 'pessimistic_write' },
    });
    if (!dam) throw notFound();
    return dam;
  }

  async function refuseWithoutEngineer(damId: string, personId: string, actor: Actor): Promise<void> {
    const members = await manager.findBy(MembershipEntity, { damId });
    const lost = members.some((each) => each.personId === personId && each.roles.includes('engineer'));
    const left = members.some((each) => each.personId !== personId && each.roles.includes('engineer'));
    if (!lost || left || actor.admin) return;
    throw conflict(
      'conflict',
      'The last engineer',
      'This is the only engineer of the dam. Give the part to another person first, or ask an administrator.',
    );
  }

  async function findPerson(personId: string): Promise<PersonEntity> {
    const person = await manager.findOneBy(PersonEntity, { id: personId });
    if (!person || person.deactivatedAt)
      throw notFound('There is no such person, or their sign-in was ended.');
    return person;
  }

  async function tellAdded(dam: DamEntity, person: PersonEntity, roles: DamRole[], actor: Actor) {
    const letter = addedToDamMail({
      addedBy: actor.name,
      damName: dam.name,
      parts: rolesInWords(roles),
      url: `${config.publicUrl}/dams/${dam.id}`,
    });
    await queueMail(deps, { personId: person.id, to: person.email, damId: dam.id, ...letter });
  }

  return {
    /** Gives a person exactly these parts. A new member is told by mail, unless `quiet`. */
    async setRoles(
      damId: string,
      personId: string,
      wanted: readonly DamRole[],
      actor: Actor,
      { quiet = false } = {},
    ): Promise<void> {
      const dam = await findDamLocked(damId);
      const person = await findPerson(personId);
      const roles = orderedRoles(wanted);
      if (!roles.includes('engineer')) await refuseWithoutEngineer(damId, personId, actor);
      const before = await manager.findOneBy(MembershipEntity, { damId, personId });
      await manager.upsert(MembershipEntity, { damId, personId, roles }, ['damId', 'personId']);
      await writeEvent(manager, {
        damId,
        personId: actor.id,
        type: before ? 'member.changed' : 'member.added',
        text: `${before ? 'made' : 'added'} ${person.name} ${before ? '' : 'as '}${rolesInWords(roles)}`,
        detail: { personId, roles },
      });
      await announce(damId, personId);
      if (!before && !quiet) await tellAdded(dam, person, roles, actor);
    },

    async remove(damId: string, personId: string, actor: Actor): Promise<void> {
      await findDamLocked(damId);
      await refuseWithoutEngineer(damId, personId, actor);
      const person = await manager.findOneBy(PersonEntity, { id: personId });
      const { affected } = await manager.delete(MembershipEntity, { damId, personId });
      if (!person || affected !== 1) throw notFound('This person does not belong to the dam.');
      await writeEvent(manager, {
        damId,
        personId: actor.id,
        type: 'member.removed',
        text: `took ${person.name} off the dam`,
        detail: { personId },
      });
      await announce(damId, personId);
    },
  };
}
