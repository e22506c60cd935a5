import type { EntityManager } from 'typeorm';
import { conflict } from '#server/errors/app-error.ts';

export interface OpenMustAnswer {
  id: string;
  number: number;
  /** First words of what was asked. */
  text: string;
}

/** Characters of a note that a refusal quotes. */
const QUOTED = 80;

/** Notes of a net that a reviewer wants answered before acceptance and that nobody has answered, by number. */
export async function openMustAnswer(manager: EntityManager, netId: string): Promise<OpenMustAnswer[]> {
  return manager.query(
    `SELECT n.id, n.number, left(e.text, ${QUOTED}) AS text
      FROM note n JOIN LATERAL (
        SELECT text FROM note_entry WHERE note_id = n.id ORDER BY created_at, id LIMIT 1
      ) e ON true
      WHERE n.net_id = $1 AND n.state = 'open' AND n.must_answer_at IS NOT NULL ORDER BY n.number`,
    [netId],
  );
}

/**
 * Refuses the acceptance of a net while such notes are open. To be called under the net's lock.
 * @throws AppError conflict, with the notes in `extra.notes`
 */
export async function refuseUnanswered(manager: EntityManager, netId: string): Promise<void> {
  const notes = await openMustAnswer(manager, netId);
  if (notes.length === 0) return;
  const list = notes.map(({ number, text }) => `note ${number} (${text})`).join('; ');
  throw conflict(
    'conflict',
    'Notes must be answered first',
    `Before acceptance these must be answered: ${list}.`,
    { notes },
  );
}
