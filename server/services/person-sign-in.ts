import { type EntityManager, IsNull } from 'typeorm';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { Actor } from '#server/http/route-record.ts';
import { isPasswordRight } from './password-service.ts';

const actorOf = ({ id, name, email, admin }: PersonEntity): Actor => ({ id, name, email, admin });

/** The person of a session; null once deactivated. */
export async function findActor(manager: EntityManager, personId: string): Promise<Actor | null> {
  const person = await manager.findOneBy(PersonEntity, { id: personId, deactivatedAt: IsNull() });
  return person ? actorOf(person) : null;
}

/**
 * The person whom e-mail and password name. Unknown, invited and deactivated people get the same answer, after
 * the same work, as a wrong password.
 */
export async function findByPassword(
  manager: EntityManager,
  email: string,
  password: string,
): Promise<Actor | null> {
  const person = await manager.findOneBy(PersonEntity, { email: email.trim().toLowerCase() });
  const right = await isPasswordRight(person?.passwordHash ?? null, password);
  return person && right && person.deactivatedAt === null ? actorOf(person) : null;
}
