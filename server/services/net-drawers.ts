import type { EntityManager } from 'typeorm';
import type { PersonRef } from '#shared/contract/common.ts';

/**
 * Everybody who made or changed what the net shows: who started it, whoever sent commands to it or to the nets it
 * is a copy of, whoever changed the section's known points through any of its nets, and whoever the entities name.
 */
const DREW = `
  WITH RECURSIVE lineage AS (
    SELECT id, section_id, copied_from, created_by FROM net WHERE id = $1
    UNION
    SELECT n.id, n.section_id, n.copied_from, n.created_by FROM net n JOIN lineage l ON n.id = l.copied_from
  ),
  drew AS (
    SELECT created_by AS id FROM lineage
    UNION
    SELECT b.person_id FROM command_batch b JOIN lineage l ON b.net_id = l.id
    UNION
    SELECT b.person_id FROM command_batch b JOIN net n ON n.id = b.net_id
      WHERE n.section_id IN (SELECT section_id FROM lineage) AND (b.result->>'sectionChanged')::boolean
    UNION
    SELECT e.changed_by FROM document_entity e
      WHERE e.owner_id IN (SELECT id FROM lineage UNION SELECT section_id FROM lineage)
  )
  SELECT p.id, p.name FROM drew JOIN person p ON p.id = drew.id ORDER BY p.name, p.id`;

/** The people who drew the net, by name. Who drew cannot accept. */
export function drawersOfNet(manager: EntityManager, netId: string): Promise<PersonRef[]> {
  return manager.query(DREW, [netId]);
}
