import type { EntityManager, EntitySubscriberInterface } from 'typeorm';

/**
 * Runs `action` once the manager's transaction is committed, and never if it is rolled back; at once when there is
 * no transaction. For the ports kept in memory, which the database cannot hold back by itself.
 */
export function afterCommit(manager: EntityManager, action: () => void): void {
  const runner = manager.queryRunner;
  if (!runner?.isTransactionActive) {
    action();
    return;
  }
  const { subscribers } = manager.connection;
  let over = false;
  const end = () => {
    over = true;
    // Not while the list is being gone through.
    setImmediate(() => subscribers.splice(subscribers.indexOf(subscriber), 1));
  };
  const subscriber: EntitySubscriberInterface = {
    afterTransactionCommit(event) {
      // A savepoint inside the transaction decides nothing yet.
      if (over || event.queryRunner !== runner || runner.isTransactionActive) return;
      end();
      action();
    },
    afterTransactionRollback(event) {
      if (!over && event.queryRunner === runner) end();
    },
  };
  subscribers.push(subscriber);
}
