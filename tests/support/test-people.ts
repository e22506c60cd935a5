import { hash } from '@node-rs/argon2';
import type { DataSource } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import { DamEntity, MembershipEntity } from '#server/entities/dam-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import type { UnitSystem } from '#shared/contract/document.ts';

export interface TestPerson {
  id: string;
  name: string;
  email: string;
  password: string;
}

export const TEST_PASSWORD = 'a long enough password';
/** Weak on purpose: tests sign many people in, and checking a hash takes what the hash says it takes. */
const QUICK = { memoryCost: 1024, timeCost: 1, parallelism: 1 };

/** A person with a password, who could sign in. */
export async function addPerson(db: DataSource, name: string, { admin = false } = {}): Promise<TestPerson> {
  const id = uuidv7();
  const email = `${name.toLowerCase().replaceAll(/[^a-z]+/g, '.')}.${id.slice(-6)}@harrow-fen.example`;
  const passwordHash = await hash(TEST_PASSWORD, QUICK);
  await db.getRepository(PersonEntity).insert({ id, name, email, passwordHash, admin });
  return { id, name, email, password: TEST_PASSWORD };
}

/** A dam, made by somebody. */
export async function addDam(
  db: DataSource,
  createdBy: string,
  { name = 'Harrow Fen Dam', unitSystem = 'SI' as UnitSystem } = {},
): Promise<string> {
  const id = uuidv7();
  await db.getRepository(DamEntity).insert({
    id,
    name,
    unitSystem,
    datum: 'local datum LD',
    fullSupplyLevel: unitSystem === 'SI' ? 118 : 387,
    gammaW: unitSystem === 'SI' ? 9.81 : 62.4,
    createdBy,
  });
  return id;
}

/** Gives a person parts on a dam. */
export async function addMember(
  db: DataSource,
  damId: string,
  personId: string,
  ...roles: DamRole[]
): Promise<void> {
  await db.getRepository(MembershipEntity).insert({ damId, personId, roles });
}
