import type { PersonEntity } from '#server/entities/person-entity.ts';
import type { PersonDto } from '#shared/contract/people.ts';

type StateFacts = Pick<PersonEntity, 'passwordHash' | 'deactivatedAt'>;

export function personState({ passwordHash, deactivatedAt }: StateFacts): PersonDto['state'] {
  if (deactivatedAt) return 'deactivated';
  return passwordHash === null ? 'invited' : 'active';
}

export const toPersonDto = (person: PersonEntity): PersonDto => ({
  id: person.id,
  name: person.name,
  email: person.email,
  admin: person.admin,
  state: personState(person),
  createdAt: person.createdAt.toISOString(),
});
