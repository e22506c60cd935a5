import { In } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { DocumentEntityRow, NetEntity } from '#server/entities/net-entity.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { MAX_OPS_PER_BATCH } from '#shared/contract/limits.ts';
import type { netFileInput } from '#shared/contract/net-files.ts';
import { createCommandService } from './command-service.ts';
import { readDocument } from './net-document.ts';
import { parseNetFile } from './net-file.ts';
import { opsOfFile } from './net-file-ops.ts';
import {
  askOpen,
  documentOf,
  questionsOf,
  refuseOtherSheet,
  refuseOtherUnits,
  setOutChoice,
} from './net-file-refusals.ts';
import { lockSection } from './net-locks.ts';
import { placeOfNet, placeOfSection, refusePutAway } from './net-place.ts';
import { createNetService } from './net-service.ts';
import type { ServiceDeps } from './service-deps.ts';

type Input = z.output<typeof netFileInput>;

const LABEL = 'took the net from a file';

/** Nets made of files. Runs in a transaction of the caller: the net is there with all its lines, or not at all. */
export function createNetFileService(deps: Pick<ServiceDeps, 'manager' | 'clock' | 'live'>) {
  const { manager } = deps;

  /** Ids that entities of the section and of its nets have, removed ones included. */
  async function takenIds(sectionId: string, file: FlowNetDocument): Promise<Set<string>> {
    const nets = await manager.find(NetEntity, { select: { id: true }, where: { sectionId } });
    const rows = await manager.find(DocumentEntityRow, {
      select: { ownerId: true, entityId: true },
      where: {
        ownerId: In([sectionId, ...nets.map((net) => net.id)]),
        entityId: In(Object.keys(file.entities)),
      },
    });
    return new Set(rows.map((row) => row.entityId));
  }

  return {
    /**
     * Makes a net of this section as the file has it. The file's set-out is taken where the section has none. Answers
     * with what was done otherwise than the file says.
     * @throws AppError invalid-input for a file that is no net or of another sheet or unit system; conflict while a
     * question about it is open
     */
    async take(sectionId: string, { id, name, text, accepted }: Input, actor: Actor): Promise<string[]> {
      const file = documentOf(parseNetFile(text));
      await lockSection(manager, sectionId);
      const section = await placeOfSection(manager, sectionId);
      refusePutAway(section);
      refuseOtherUnits(file, section.dam.unitSystem);
      refuseOtherSheet(file, section.sheet);
      const taken = await takenIds(sectionId, file);
      await createNetService(deps).create(sectionId, { id, name }, actor);
      const net = await readDocument(manager, await placeOfNet(manager, id));
      const questions = questionsOf(file, net);
      askOpen(questions, accepted);
      const ops = opsOfFile(file, net, { taken, withSetOut: setOutChoice(file, net) === 'file' });
      const clientId = uuidv7();
      for (let first = 0; first < ops.length; first += MAX_OPS_PER_BATCH) {
        const some = ops.slice(first, first + MAX_OPS_PER_BATCH);
        const seq = first / MAX_OPS_PER_BATCH + 1;
        await createCommandService(deps).apply(id, { clientId, seq, label: LABEL, ops: some }, actor);
      }
      return questions.map((question) => question.text);
    },
  };
}
