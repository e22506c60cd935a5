import { createHash } from 'node:crypto';
import { type EntityManager, In, type QueryDeepPartialEntity } from 'typeorm';
import { CommandBatchEntity, DocumentEntityRow, NetEntity } from '#server/entities/net-entity.ts';
import { invalidInput, unprocessable } from '#server/errors/app-error.ts';
import type { Clock } from '#server/http/clock.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { LivePort } from '#server/live/live-port.ts';
import { SINGLE_KINDS } from '#shared/contract/document.ts';
import type { CommandBatch, CommandResult } from '#shared/contract/nets.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { faultsOf, type HeldEntity, isSectionKind, type JudgedOp, judgeOps } from './command-ops.ts';
import { writeEvent } from './event-writer.ts';
import { type LockedNet, lockNet, lockNetsOfSection, lockSectionOfNet } from './net-locks.ts';
import { type NetPlace, placeOfNet, refusePutAway } from './net-place.ts';
import { personRefs } from './person-refs.ts';

export interface CommandServiceDeps {
  manager: EntityManager;
  clock: Clock;
  live: LivePort;
}

/** What is kept of a batch: its answer, a hash to know a repeat by, and whether it set the section out anew. */
interface StoredBatch {
  sha256: string;
  sectionChanged: boolean;
  answer: CommandResult;
}

/**
 * Applies batches of commands to a net's document. Runs in a transaction of the caller, which answers nothing before
 * the commit: what is acknowledged is kept.
 */
export function createCommandService({ manager, clock, live }: CommandServiceDeps) {
  async function apply(netId: string, batch: CommandBatch, actor: Actor): Promise<CommandResult> {
    await lockSectionOfNet(manager, netId);
    const stored = await storedAnswer(netId, batch);
    if (stored) return stored;
    const place = await placeOfNet(manager, netId);
    refusePutAway(place, 422);
    const held = await loadHeld(place, batch);
    const faults = faultsOf(batch.ops, held);
    if (faults.length > 0) throw invalidInput(faults);

    const { outcomes, changed } = judgeOps(batch.ops, held, actor.id);
    const sectionChanged = changed.some((entity) => isSectionKind(entity.kind));
    const nets = sectionChanged
      ? await lockNetsOfSection(manager, place.section.id)
      : [await lockNet(manager, netId)];
    const changeNumber = changed.length > 0 ? nextNumber(nets) : numberOf(nets, netId);
    const answer = { changeNumber, outcomes: await presentOutcomes(outcomes) };
    if (changed.length > 0) {
      await writeEntities(place, changed, changeNumber, batch);
      await numberNets(nets, changeNumber);
      await announce(place, nets, changeNumber, batch, actor);
    }
    await store(netId, batch, actor, { sha256: hashOf(batch), sectionChanged, answer });
    return answer;
  }

  async function storedAnswer(netId: string, batch: CommandBatch): Promise<CommandResult | null> {
    const { clientId, seq } = batch;
    const row = await manager.findOneBy(CommandBatchEntity, { netId, clientId, seq });
    if (!row) return null;
    const stored = row.result as StoredBatch;
    if (stored.sha256 === hashOf(batch)) return stored.answer;
    throw unprocessable(
      'invalid-input',
      'This number was used before',
      'This browser sent other changes under the same number before, so these were not taken. Reload the page.',
    );
  }

  /** The entities the batch names, and the single ones, of the net and of its section. */
  async function loadHeld(place: NetPlace, batch: CommandBatch): Promise<Map<string, HeldEntity>> {
    const ownerId = In([place.net.id, place.section.id]);
    const rows = await manager.find(DocumentEntityRow, {
      where: [
        { ownerId, entityId: In(batch.ops.map((op) => op.entityId)) },
        { ownerId, kind: In([...SINGLE_KINDS]) },
      ],
    });
    return new Map(rows.map((row) => [row.entityId, row]));
  }

  async function presentOutcomes(outcomes: JudgedOp[]): Promise<CommandResult['outcomes']> {
    const people = await personRefs(
      manager,
      outcomes.map((outcome) => outcome.changedBy),
    );
    return outcomes.map((outcome) => ({
      ...outcome,
      changedBy: outcome.changedBy === null ? null : (people.get(outcome.changedBy) ?? null),
    }));
  }

  async function writeEntities(
    { net, section }: NetPlace,
    changed: HeldEntity[],
    changeNumber: number,
    { clientId }: CommandBatch,
  ): Promise<void> {
    const changedAt = clock.now();
    const rows: DocumentEntityRow[] = changed.map(
      ({ entityId, kind, version, value, removed, changedBy }) => {
        const owner = isSectionKind(kind)
          ? { ownerId: section.id, sectionId: section.id, netId: null }
          : { ownerId: net.id, sectionId: null, netId: net.id };
        const change = { changeNumber: String(changeNumber), clientId, changedBy, changedAt };
        return { ...owner, entityId, kind, version, value, removed, ...change };
      },
    );
    await manager.upsert(DocumentEntityRow, rows as QueryDeepPartialEntity<DocumentEntityRow>[], [
      'ownerId',
      'entityId',
    ]);
  }

  async function numberNets(nets: LockedNet[], changeNumber: number): Promise<void> {
    const change = { changeNumber: String(changeNumber), updatedAt: clock.now() };
    await manager.update(NetEntity, { id: In(nets.map((net) => net.id)) }, change);
  }

  async function announce(
    { net, section, drawing, dam }: NetPlace,
    nets: LockedNet[],
    number: number,
    { clientId, label }: CommandBatch,
    actor: Actor,
  ): Promise<void> {
    await writeEvent(manager, {
      damId: dam.id,
      drawingId: drawing.id,
      netId: net.id,
      personId: actor.id,
      type: 'net.changed',
      text: `${label || 'changed the net'} on ${sectionTitle(section.name)}, ${net.name}`,
      detail: { changeNumber: number },
    });
    for (const each of nets)
      await live.publish(manager, { type: 'net', damId: dam.id, netId: each.id, number, clientId });
  }

  async function store(netId: string, batch: CommandBatch, actor: Actor, result: StoredBatch): Promise<void> {
    const { clientId, seq, label } = batch;
    const changeNumber = String(result.answer.changeNumber);
    const row = { netId, clientId, seq, personId: actor.id, changeNumber, label, receivedAt: clock.now() };
    await manager.insert(CommandBatchEntity, {
      ...row,
      result,
    } as unknown as QueryDeepPartialEntity<CommandBatchEntity>);
  }

  return { apply };
}

/** Whether some op of the batch was not applied. */
export const hasConflict = (result: CommandResult): boolean =>
  result.outcomes.some((outcome) => outcome.outcome === 'conflict');

const nextNumber = (nets: LockedNet[]) => Math.max(...nets.map((net) => net.changeNumber)) + 1;

const numberOf = (nets: LockedNet[], netId: string) =>
  nets.find((net) => net.id === netId)?.changeNumber ?? 0;

const hashOf = ({ label, ops }: CommandBatch) =>
  createHash('sha256').update(JSON.stringify({ label, ops })).digest('hex');
