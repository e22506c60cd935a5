import { IsNull, Not } from 'typeorm';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { passwordResetMail } from '#server/mail/templates/people-mails.ts';
import { queueMail } from './mail-service.ts';
import { createPersonService } from './person-service.ts';
import { consumeToken, issueToken, RESET_MINUTES } from './person-token.ts';
import type { ServiceDeps } from './service-deps.ts';

/** A forgotten password, by mail. Runs in a transaction of the caller. */
export function createPasswordResetService(deps: ServiceDeps) {
  const { manager, clock, config } = deps;
  return {
    /** Sends a link to a person who signs in under this address; for any other address nothing happens. */
    async request(email: string): Promise<void> {
      const person = await manager.findOneBy(PersonEntity, {
        email,
        deactivatedAt: IsNull(),
        passwordHash: Not(IsNull()),
      });
      if (!person) return;
      const token = await issueToken(manager, {
        personId: person.id,
        purpose: 'reset',
        issuedBy: null,
        damId: null,
        now: clock.now(),
      });
      const url = `${config.publicUrl}/reset-password#${token}`;
      const letter = passwordResetMail({ url, minutesValid: RESET_MINUTES });
      await queueMail(deps, { personId: person.id, to: person.email, ...letter });
    },

    /** Sets the password the link was asked for; every session of the person ends. @throws AppError token-invalid */
    async complete(token: string, password: string): Promise<void> {
      const personId = await consumeToken(manager, token, 'reset', clock.now());
      await createPersonService(deps).setPassword(personId, password, null);
    },
  };
}
