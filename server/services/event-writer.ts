import type { EntityManager, QueryDeepPartialEntity } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import { EventEntity } from '#server/entities/dam-entity.ts';

export interface EventInput {
  damId: string | null;
  drawingId?: string | null;
  netId?: string | null;
  /** Who did it; null for what the server did by itself. */
  personId: string | null;
  /** Dotted, thing first: `net.changed`, `drawing.uploaded`. */
  type: string;
  /** The sentence for the activity list, without the person's name: "traced line 3 on Section B–B". */
  text: string;
  detail?: Record<string, unknown>;
}

/** Writes who did what, in the transaction of the change itself. */
export async function writeEvent(manager: EntityManager, event: EventInput): Promise<void> {
  const row: Partial<EventEntity> = {
    id: uuidv7(),
    damId: event.damId,
    drawingId: event.drawingId ?? null,
    netId: event.netId ?? null,
    personId: event.personId,
    type: event.type,
    text: event.text,
    detail: event.detail ?? {},
  };
  // TypeORM's partial type cannot say "any JSON object".
  await manager.insert(EventEntity, row as QueryDeepPartialEntity<EventEntity>);
}
