import { setTimeout as delay } from 'node:timers/promises';
import type { DataSource } from 'typeorm';

/** Waits for something that another process does. */
export async function until(isTrue: () => boolean | Promise<boolean>, seconds = 20): Promise<void> {
  const deadline = Date.now() + seconds * 1000;
  while (!(await isTrue())) {
    if (Date.now() > deadline) throw new Error(`It did not happen within ${seconds} s.`);
    await delay(20);
  }
}

/** Whether somebody stands in the middle of a transaction, before a lock that another holds. */
export async function someoneWaits(db: DataSource): Promise<boolean> {
  const [{ count }] = await db.query(
    "SELECT count(*)::int FROM pg_stat_activity WHERE datname = current_database() AND wait_event_type = 'Lock'",
  );
  return count > 0;
}

/** Holds what a statement locks, so that whoever needs it stands still there in the middle of a transaction. */
export async function whileHeld(
  db: DataSource,
  statement: string,
  work: (letGo: () => Promise<void>) => Promise<void>,
): Promise<void> {
  const holder = db.createQueryRunner();
  await holder.startTransaction();
  try {
    await holder.query(statement);
    await work(() => holder.rollbackTransaction());
  } finally {
    if (holder.isTransactionActive) await holder.rollbackTransaction();
    await holder.release();
  }
}
