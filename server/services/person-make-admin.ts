import type { EntityManager } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { writeEvent } from './event-writer.ts';
import { hashPassword } from './password-service.ts';
import { issueToken, voidTokens } from './person-token.ts';

export interface AdminRequest {
  email: string;
  name: string;
  /** Null: the person chooses one through a link that works once. */
  password: string | null;
}

/**
 * Makes an administrator from outside, for whoever holds the database: a new person, or one who is there already
 * and may sign in again. Returns the token of an invitation for somebody who has no password yet, otherwise null.
 */
export async function makeAdmin(
  manager: EntityManager,
  { email, name, password }: AdminRequest,
  now: Date,
): Promise<string | null> {
  const known = await manager.findOneBy(PersonEntity, { email });
  const id = known?.id ?? uuidv7();
  const passwordHash = password === null ? (known?.passwordHash ?? null) : await hashPassword(password);
  const facts = { admin: true, deactivatedAt: null, passwordHash };
  if (known) await manager.update(PersonEntity, { id }, facts);
  else await manager.insert(PersonEntity, { id, email, name, createdAt: now, ...facts });
  await writeEvent(manager, {
    damId: null,
    personId: null,
    type: 'person.adminMade',
    text: `${email} was made an administrator on the server`,
    detail: { personId: id },
  });
  if (password !== null) {
    await voidTokens(manager, id, now);
    await manager.query(`DELETE FROM session WHERE sess -> 'passport' ->> 'user' = $1`, [id]);
  }
  if (passwordHash !== null) return null;
  return issueToken(manager, { personId: id, purpose: 'invitation', issuedBy: null, damId: null, now });
}
