import { v7 as uuidv7 } from 'uuid';
import { DamEntity, MembershipEntity } from '#server/entities/dam-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { addedToDamMail, invitationMail } from '#server/mail/templates/people-mails.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import { writeEvent } from './event-writer.ts';
import { queueMail } from './mail-service.ts';
import { createMemberService } from './member-service.ts';
import { hashPassword } from './password-service.ts';
import { personState } from './person-state.ts';
import { consumeToken, findToken, INVITATION_DAYS, issueToken, voidTokens } from './person-token.ts';
import { rolesInWords } from './role-words.ts';
import type { ServiceDeps } from './service-deps.ts';

/** Where a dam-less invitation's text says nothing about parts. */
const NO_DAM = { damId: null, damName: null, parts: '' } as const;

/** Bringing people in. Registration is open to nobody else. Runs in a transaction of the caller. */
export function createInvitationService(deps: ServiceDeps) {
  const { manager, clock, config } = deps;
  const members = createMemberService(deps);

  const findByEmail = (email: string) => manager.findOneBy(PersonEntity, { email });

  /** A row without a password: invited. The address stands for the name until the invitation is accepted. */
  async function addInvited(email: string, admin: boolean): Promise<PersonEntity> {
    await manager
      .createQueryBuilder()
      .insert()
      .into(PersonEntity)
      .values({ id: uuidv7(), email, name: email, passwordHash: null, admin, createdAt: clock.now() })
      // Somebody else may be inviting the same address at this moment.
      .orIgnore()
      .execute();
    return manager.findOneByOrFail(PersonEntity, { email });
  }

  async function sendInvitation(
    person: PersonEntity,
    actor: Actor,
    dam: { damId: string | null; damName: string | null; parts: string },
  ): Promise<void> {
    const token = await issueToken(manager, {
      personId: person.id,
      purpose: 'invitation',
      issuedBy: actor.id,
      damId: dam.damId,
      now: clock.now(),
    });
    const letter = invitationMail({
      invitedBy: actor.name,
      damName: dam.damName,
      parts: dam.parts,
      // In the fragment, which browsers keep to themselves: the token reaches no log.
      url: `${config.publicUrl}/invitation#${token}`,
      daysValid: INVITATION_DAYS,
    });
    await queueMail(deps, { personId: person.id, to: person.email, ...letter });
  }

  function refuseDeactivated(person: PersonEntity | null): void {
    if (!person?.deactivatedAt) return;
    throw conflict(
      'conflict',
      'This sign-in was ended',
      'The sign-in of this person was ended. An administrator can let them sign in again.',
    );
  }

  return {
    /** Invites to the installation, or again when the first invitation was not accepted yet. */
    async inviteToInstallation(email: string, admin: boolean, actor: Actor): Promise<PersonEntity> {
      const known = await findByEmail(email);
      refuseDeactivated(known);
      if (known && personState(known) === 'active')
        throw conflict(
          'already-exists',
          'Already here',
          'A person with this e-mail address signs in already.',
        );
      if (known) await manager.update(PersonEntity, { id: known.id }, { admin });
      const person = known ?? (await addInvited(email, admin));
      await sendInvitation(person, actor, NO_DAM);
      await writeEvent(manager, {
        damId: null,
        personId: actor.id,
        type: 'person.invited',
        text: `invited ${email}`,
        detail: { personId: person.id },
      });
      return { ...person, admin };
    },

    /** Adds the parts to whatever the person has on the dam; a person not known yet is invited. */
    async inviteToDam(damId: string, email: string, roles: DamRole[], actor: Actor): Promise<string> {
      const dam = await manager.findOneBy(DamEntity, { id: damId });
      if (!dam) throw notFound();
      const known = await findByEmail(email);
      refuseDeactivated(known);
      const person = known ?? (await addInvited(email, false));
      const held = await manager.findOneBy(MembershipEntity, { damId, personId: person.id });
      await members.setRoles(damId, person.id, [...(held?.roles ?? []), ...roles], actor, { quiet: true });
      const words = { damName: dam.name, parts: rolesInWords(roles) };
      if (personState(person) === 'invited') await sendInvitation(person, actor, { damId, ...words });
      else
        await queueMail(deps, {
          personId: person.id,
          to: person.email,
          damId,
          ...addedToDamMail({ addedBy: actor.name, ...words, url: `${config.publicUrl}/dams/${damId}` }),
        });
      return person.id;
    },

    /** What the page says before the invitation is accepted. @throws AppError token-invalid */
    async lookUp(token: string): Promise<{ email: string; invitedBy: string; damName: string | null }> {
      const row = await findToken(manager, token, 'invitation', clock.now());
      const [person, issuer, dam] = await Promise.all([
        manager.findOneByOrFail(PersonEntity, { id: row.personId }),
        row.issuedBy ? manager.findOneBy(PersonEntity, { id: row.issuedBy }) : null,
        row.damId ? manager.findOneBy(DamEntity, { id: row.damId }) : null,
      ]);
      return { email: person.email, invitedBy: issuer?.name ?? 'Tracehead', damName: dam?.name ?? null };
    },

    /** Gives the invited person name and password. @throws AppError token-invalid */
    async accept(token: string, name: string, password: string): Promise<Actor> {
      const personId = await consumeToken(manager, token, 'invitation', clock.now());
      await manager.update(
        PersonEntity,
        { id: personId },
        { name, passwordHash: await hashPassword(password) },
      );
      await voidTokens(manager, personId, clock.now());
      const parts = await manager.findBy(MembershipEntity, { personId });
      const written = { personId, type: 'person.joined', text: 'accepted the invitation' };
      await writeEvent(manager, { damId: null, ...written });
      for (const { damId } of parts) {
        await writeEvent(manager, { damId, ...written });
        await deps.live.publish(manager, { type: 'dam', damId });
      }
      const { id, email, admin } = await manager.findOneByOrFail(PersonEntity, { id: personId });
      return { id, name, email, admin };
    },
  };
}
