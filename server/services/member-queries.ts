import type { EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import { notFound } from '#server/errors/app-error.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import type { memberDto } from '#shared/contract/dams.ts';
import { personState } from './person-state.ts';
import { orderedRoles } from './role-words.ts';

type MemberDto = z.output<typeof memberDto>;

interface MemberRow {
  id: string;
  name: string;
  email: string;
  roles: DamRole[];
  password_hash: string | null;
  deactivated_at: Date | null;
}

const toDto = (row: MemberRow): MemberDto => ({
  person: { id: row.id, name: row.name },
  email: row.email,
  roles: orderedRoles(row.roles),
  state: personState({ passwordHash: row.password_hash, deactivatedAt: row.deactivated_at }),
});

const MEMBERS = `SELECT p.id, p.name, p.email, p.password_hash, p.deactivated_at, m.roles
  FROM membership m JOIN person p ON p.id = m.person_id WHERE m.dam_id = $1`;

export async function listMembers(manager: EntityManager, damId: string): Promise<MemberDto[]> {
  const rows: MemberRow[] = await manager.query(`${MEMBERS} ORDER BY p.name, p.id`, [damId]);
  return rows.map(toDto);
}

/** @throws AppError not-found */
export async function getMember(manager: EntityManager, damId: string, personId: string): Promise<MemberDto> {
  const rows: MemberRow[] = await manager.query(`${MEMBERS} AND p.id = $2`, [damId, personId]);
  if (!rows[0]) throw notFound('This person does not belong to the dam.');
  return toDto(rows[0]);
}
