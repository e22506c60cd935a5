import type { EntityManager } from 'typeorm';
import type { AppDeps } from '#server/app-deps.ts';

/** What services work with; `manager` is the transaction's while there is one. */
export type ServiceDeps = Omit<AppDeps, 'db'> & { manager: EntityManager };

/** Services outside a transaction, for reading. */
export const readingDeps = (deps: AppDeps): ServiceDeps => ({ ...deps, manager: deps.db.manager });

/** Runs `work` in one transaction: the change, its event, its mail and its announcement exist together or not at all. */
export const inTransaction = <T>(deps: AppDeps, work: (deps: ServiceDeps) => Promise<T>): Promise<T> =>
  deps.db.transaction((manager) => work({ ...deps, manager }));
