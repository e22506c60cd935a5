import type { EntityManager } from 'typeorm';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { Actor } from '#server/http/route-record.ts';
import { hashPassword } from '#server/services/password-service.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import { demoId } from './demo-ids.ts';

/** One password for the whole demo; there are no demo accounts in production. */
export const DEMO_PASSWORD = 'harrow fen 118';

interface DemoPerson extends Actor {
  roles: DamRole[];
  /** What the sign-in page says of the person. */
  part: string;
}

const person = (number: number, name: string, roles: DamRole[], part: string, admin = false): DemoPerson => ({
  id: demoId(number),
  name,
  email: `${name.toLowerCase().replace(' ', '.')}@harrow-fen.example`,
  admin,
  roles,
  part,
});

export const engineer = person(1, 'Iris Marsh', ['engineer'], 'engineer: draws and sends for checking');
export const reviewer = person(2, 'Remi Okafor', ['reviewer'], 'reviewer: checks and decides');
export const colleague = person(3, 'Tove Lind', ['colleague'], 'colleague: reads and comments');
export const admin = person(4, 'Ada Quist', [], 'administrator: people and mail', true);
export const demoPeople = [engineer, reviewer, colleague, admin];

/** Adds the people that are not there yet. */
export async function addDemoPeople(manager: EntityManager): Promise<void> {
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  const rows = demoPeople.map(({ id, name, email, admin: isAdmin }) => ({
    id,
    name,
    email,
    admin: isAdmin,
    passwordHash,
  }));
  await manager.createQueryBuilder().insert().into(PersonEntity).values(rows).orIgnore().execute();
}

/** What the sign-in page offers. */
export const demoSignIns = () =>
  demoPeople.map(({ name, email, part }) => ({ name, email, password: DEMO_PASSWORD, part }));
