import { type EntityManager, In } from 'typeorm';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { conflict } from '#server/errors/app-error.ts';
import type { ArchivedPerson } from '#shared/contract/archives.ts';
import type { PersonRef } from '#shared/contract/common.ts';

export interface RestoredPeople {
  /** From the id in the archive to that of the account here, where they differ. */
  accountOf: Map<string, string>;
  made: PersonRef[];
}

/**
 * Sees to it that everybody whom the rows name is there: an account with the same id, or with the same address, or else a
 * new one that nobody can sign in with. Where only the address is the same, the frozen records still name the old id, for
 * which a closed stand-in is made; everything else names the account.
 */
export async function restorePeople(
  manager: EntityManager,
  people: readonly ArchivedPerson[],
  now: Date,
): Promise<RestoredPeople> {
  const accountOf = new Map<string, string>();
  const made: PersonRef[] = [];
  const there = new Set(
    (await manager.findBy(PersonEntity, { id: In(people.map(({ id }) => id)) })).map(({ id }) => id),
  );
  for (const { id, name, email } of people) {
    if (there.has(id)) continue;
    const account = await manager.findOneBy(PersonEntity, { email: email.toLowerCase() });
    if (account) accountOf.set(id, account.id);
    else made.push({ id, name });
    await manager.insert(PersonEntity, {
      id,
      name,
      email: account ? standInAddress(id) : email.toLowerCase(),
      passwordHash: null,
      deactivatedAt: now,
    });
  }
  return { accountOf, made };
}

/** An address at which there can be no mailbox (RFC 2606). */
const standInAddress = (id: string) => `${id}@archived.invalid`;

/**
 * Whoever drew a revision must not accept it under another id: refuses while a revision that waits names one.
 * @throws AppError conflict
 */
export async function refuseOpenOwnWork(
  manager: EntityManager,
  damId: string,
  { accountOf }: RestoredPeople,
): Promise<void> {
  const ids = [...accountOf.keys()];
  if (ids.length === 0) return;
  const open: Array<{ label: string }> = await manager.query(
    `SELECT r.label FROM revision r
      JOIN net n ON n.id = r.net_id JOIN section c ON c.id = n.section_id JOIN sheet s ON s.id = c.sheet_id
      JOIN drawing d ON d.id = s.drawing_id
      WHERE d.dam_id = $1 AND (r.drawn_by && $2::uuid[] OR r.sent_by = ANY($2))
        AND NOT EXISTS (SELECT 1 FROM decision x WHERE x.revision_id = r.id) LIMIT 1`,
    [damId, ids],
  );
  const [found] = open;
  if (found)
    throw conflict(
      'conflict',
      'A revision waits that somebody here has drawn',
      `Revision ${found.label} waits for a decision, and who drew it has another account here with the same address. Change the address of that account first, then restore again; nothing was restored.`,
    );
}
