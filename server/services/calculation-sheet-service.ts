import type { EntityManager } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { CalculationSheetEntity } from '#server/entities/calculation-sheet-entity.ts';
import { ArtifactEntity, RevisionEntity } from '#server/entities/ledger-entity.ts';
import { AppError, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { CalculationSheetDto, calculationSheetInput } from '#shared/contract/calculation-sheets.ts';
import { personRefs } from './person-refs.ts';
import type { ServiceDeps } from './service-deps.ts';

/** Runs after which a fault of the server itself is no longer waited out. */
const MOST_ATTEMPTS = 3;
const LISTED = 20;

/** A file that was made and put into storage. */
export interface MadeSheet {
  storageKey: string;
  sha256: string;
  byteSize: number;
}

/** The rows of calculation sheets, which are the truth about them. Runs in a transaction of the caller. */
export function createCalculationSheetService({
  manager,
  clock,
  jobs,
}: Pick<ServiceDeps, 'manager' | 'clock' | 'jobs'>) {
  const waiting = (id: string) => ({ id, state: 'waiting' as const });

  return {
    /** Asks for a sheet; asking again with the same id changes nothing. @throws AppError not-found */
    async ask(netId: string, input: z.output<typeof calculationSheetInput>, actor: Actor): Promise<void> {
      const { id, revisionId, paper, jobNumber } = input;
      if (revisionId !== null && !(await manager.existsBy(RevisionEntity, { id: revisionId, netId })))
        throw notFound('This net has no such revision.');
      const known = await manager.findOneBy(CalculationSheetEntity, { id });
      if (known) {
        if (known.netId !== netId) throw notFound();
        return;
      }
      await manager.insert(CalculationSheetEntity, {
        id,
        netId,
        revisionId,
        paper,
        jobNumber,
        askedBy: actor.id,
        askedAt: clock.now(),
      });
      await jobs.enqueue(manager, 'make-calculation-sheet', id);
    },

    /** Counts a run of a sheet that waits; null when there is nothing to do, or when it was tried too often. */
    async begin(id: string): Promise<CalculationSheetEntity | null> {
      const row = await manager.findOne(CalculationSheetEntity, {
        where: waiting(id),
        lock: { mode: 'pessimistic_write' },
      });
      if (!row) return null;
      if (row.attempts >= MOST_ATTEMPTS) {
        await manager.update(CalculationSheetEntity, waiting(id), {
          state: 'failed',
          message:
            'The server could not make this sheet. Tell the administrator, who finds the reason in the log, and ask for it again.',
          finishedAt: clock.now(),
        });
        return null;
      }
      await manager.update(CalculationSheetEntity, { id }, { attempts: row.attempts + 1 });
      return row;
    },

    /** Enters the file; one of a revision is kept in the ledger too, once for each content. */
    async finish({ id, revisionId, paper }: CalculationSheetEntity, made: MadeSheet): Promise<void> {
      const { affected } = await manager.update(CalculationSheetEntity, waiting(id), {
        ...made,
        state: 'done',
        finishedAt: clock.now(),
      });
      if (affected !== 1 || revisionId === null) return;
      const { sha256, storageKey } = made;
      const kind = `calculation-sheet-${paper.toLowerCase()}`;
      if (await manager.existsBy(ArtifactEntity, { revisionId, kind, sha256 })) return;
      await manager.insert(ArtifactEntity, { id: uuidv7(), revisionId, kind, storageKey, sha256 });
    },

    /** Ends a sheet that cannot be made, with the sentence that says why. */
    async refuse(id: string, message: string): Promise<void> {
      await manager.update(CalculationSheetEntity, waiting(id), {
        state: 'failed',
        message,
        finishedAt: clock.now(),
      });
    },
  };
}

/** The sheets asked for of a net, newest first. */
export async function calculationSheetsOf(
  manager: EntityManager,
  netId: string,
): Promise<CalculationSheetDto[]> {
  const rows = await manager.find(CalculationSheetEntity, {
    where: { netId },
    order: { askedAt: 'DESC', id: 'DESC' },
    take: LISTED,
  });
  return present(manager, rows);
}

/** One sheet of a net. @throws AppError not-found */
export async function calculationSheetById(
  manager: EntityManager,
  netId: string,
  id: string,
): Promise<CalculationSheetDto> {
  const [sheet] = await present(manager, await manager.findBy(CalculationSheetEntity, { id, netId }));
  if (!sheet) throw notFound();
  return sheet;
}

/** Where the finished file lies and how it is called. @throws AppError not-found, conflict while it is not made */
export async function calculationSheetFile(manager: EntityManager, netId: string, id: string) {
  const row = await manager.findOneBy(CalculationSheetEntity, { id, netId });
  if (!row) throw notFound();
  if (row.storageKey === null)
    throw new AppError(
      'conflict',
      409,
      'The sheet is not ready',
      row.message || 'The sheet is still being made. Try again in a moment.',
    );
  const label = row.revisionId === null ? 'draft' : `revision ${await labelOf(manager, row.revisionId)}`;
  return { key: row.storageKey, fileName: `Calculation sheet ${label} ${row.paper}.pdf` };
}

async function labelOf(manager: EntityManager, revisionId: string): Promise<string> {
  const { label } = await manager.findOneOrFail(RevisionEntity, {
    select: { id: true, label: true },
    where: { id: revisionId },
  });
  return label;
}

async function present(
  manager: EntityManager,
  rows: CalculationSheetEntity[],
): Promise<CalculationSheetDto[]> {
  const people = await personRefs(
    manager,
    rows.map((row) => row.askedBy),
  );
  return rows.map((row) => ({
    id: row.id,
    revisionId: row.revisionId,
    paper: row.paper,
    jobNumber: row.jobNumber,
    state: row.state,
    message: row.message,
    sha256: row.sha256,
    byteSize: row.byteSize,
    askedBy: people.get(row.askedBy) ?? { id: row.askedBy, name: '' },
    askedAt: row.askedAt.toISOString(),
  }));
}

/** Queues what waited when the last process ended. */
export async function requeueCalculationSheets({
  manager,
  jobs,
}: Pick<ServiceDeps, 'manager' | 'jobs'>): Promise<void> {
  const rows = await manager.find(CalculationSheetEntity, {
    select: { id: true },
    where: { state: 'waiting' },
    order: { askedAt: 'ASC' },
  });
  for (const { id } of rows) await jobs.enqueue(manager, 'make-calculation-sheet', id);
}
