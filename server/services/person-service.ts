import { IsNull, Not } from 'typeorm';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { writeEvent } from './event-writer.ts';
import { hashPassword } from './password-service.ts';
import { endSessionsOf } from './person-sessions.ts';
import { voidTokens } from './person-token.ts';
import type { ServiceDeps } from './service-deps.ts';

/** People as the installation knows them. Runs in a transaction of the caller. */
export function createPersonService(deps: ServiceDeps) {
  const { manager, clock } = deps;

  const event = (actor: Actor, type: string, text: string, personId: string) =>
    writeEvent(manager, { damId: null, personId: actor.id, type, text, detail: { personId } });

  async function find(personId: string): Promise<PersonEntity> {
    const person = await manager.findOneBy(PersonEntity, { id: personId });
    if (!person) throw notFound('There is no such person.');
    return person;
  }

  /** The rows stay locked to the end, so that two admins cannot remove each other at once. */
  async function refuseWithoutAdmin(personId: string): Promise<void> {
    const admins = await manager.find(PersonEntity, {
      where: { admin: true, deactivatedAt: IsNull(), passwordHash: Not(IsNull()) },
      order: { id: 'ASC' },
      lock: { mode: 'pessimistic_write' },
    });
    if (admins.some((admin) => admin.id !== personId)) return;
    throw conflict(
      'conflict',
      'The last administrator',
      'This is the only administrator left. Make another person an administrator first.',
    );
  }

  async function setAdmin(person: PersonEntity, admin: boolean, actor: Actor): Promise<void> {
    if (person.admin === admin) return;
    if (!admin) await refuseWithoutAdmin(person.id);
    await manager.update(PersonEntity, { id: person.id }, { admin });
    const text = admin ? `made ${person.email} an administrator` : `made ${person.email} a member`;
    await event(actor, 'person.adminChanged', text, person.id);
    await deps.live.publish(manager, { type: 'person', personId: person.id });
  }

  async function deactivate(person: PersonEntity, actor: Actor): Promise<void> {
    if (person.deactivatedAt) return;
    if (person.id === actor.id)
      throw conflict(
        'conflict',
        'Your own sign-in',
        'You cannot end your own sign-in. Ask another administrator.',
      );
    if (person.admin) await refuseWithoutAdmin(person.id);
    await manager.update(PersonEntity, { id: person.id }, { deactivatedAt: clock.now() });
    await voidTokens(manager, person.id, clock.now());
    await endSessionsOf(deps, person.id);
    await event(actor, 'person.deactivated', `ended the sign-in of ${person.email}`, person.id);
  }

  async function reactivate(person: PersonEntity, actor: Actor): Promise<void> {
    if (!person.deactivatedAt) return;
    await manager.update(PersonEntity, { id: person.id }, { deactivatedAt: null });
    await event(actor, 'person.reactivated', `let ${person.email} sign in again`, person.id);
  }

  return {
    /** Changes who is an admin and who may sign in. @throws AppError not-found, conflict */
    async change(
      personId: string,
      patch: { admin?: boolean | undefined; active?: boolean | undefined },
      actor: Actor,
    ): Promise<PersonEntity> {
      const person = await find(personId);
      if (patch.admin !== undefined) await setAdmin(person, patch.admin, actor);
      if (patch.active === false) await deactivate(person, actor);
      if (patch.active === true) await reactivate(person, actor);
      return find(personId);
    },

    async rename(actor: Actor, name: string): Promise<PersonEntity> {
      await manager.update(PersonEntity, { id: actor.id }, { name });
      await event(actor, 'person.renamed', 'changed their name', actor.id);
      return find(actor.id);
    },

    /** Sets a new password and ends every session but `keepSid`; links for choosing one stop working. */
    async setPassword(personId: string, password: string, keepSid: string | null): Promise<void> {
      const passwordHash = await hashPassword(password);
      await manager.update(PersonEntity, { id: personId }, { passwordHash });
      await voidTokens(manager, personId, clock.now());
      await endSessionsOf(deps, personId, keepSid);
      await writeEvent(manager, {
        damId: null,
        personId,
        type: 'person.passwordChanged',
        text: 'chose a new password',
      });
    },
  };
}

/** Everyone, by name; people who have not accepted yet have none and are listed by address. */
export const listPeople = ({ manager }: Pick<ServiceDeps, 'manager'>): Promise<PersonEntity[]> =>
  manager.find(PersonEntity, { order: { name: 'ASC', email: 'ASC' } });
