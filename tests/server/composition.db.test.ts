import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as delay } from 'node:timers/promises';
import { pino } from 'pino';
import { afterEach, describe, expect, it } from 'vitest';
import { compose, type Product } from '#server/composition.ts';
import { readConfig } from '#server/config/config.ts';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { queueMail } from '#server/services/mail-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import type { LiveEvent } from '#shared/contract/live.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/test-database.ts';
import { testLetter } from '#tests/support/test-letter.ts';

const LETTER = testLetter();
const storageDir = mkdtempSync(path.join(os.tmpdir(), 'tracehead-storage-'));
const running: Product[] = [];
let database: TestDatabase;

afterEach(async () => {
  for (const product of running.splice(0)) await product.stop(1000);
  await database.drop();
  rmSync(storageDir, { recursive: true, force: true });
});

async function start(urls: Record<string, string>): Promise<Product> {
  const env = { NODE_ENV: 'test', STORAGE_DIR: storageDir, PUBLIC_URL: 'http://tracehead.test', ...urls };
  const product = await compose(readConfig(env), pino({ level: 'silent' }));
  running.push(product);
  return product;
}
const mail = (product: Product) =>
  inTransaction(product.deps, async (tx) => {
    await tx.live.publish(tx.manager, { type: 'dam', damId: crypto.randomUUID() });
    return queueMail(tx, { personId: null, to: 'remi@harrow-fen.example', ...LETTER });
  });
const until = async (isTrue: () => boolean | Promise<boolean>) => {
  const end = Date.now() + 20_000;
  while (!(await isTrue())) {
    if (Date.now() > end) throw new Error('It did not happen within 20 s.');
    await delay(50);
  }
};
const stateOf = async (product: Product, id: string) =>
  (await product.deps.db.getRepository(OutboxMailEntity).findOneByOrFail({ id })).state;

describe('the product put together', () => {
  it.each(['a login of its own', 'the owner’s login and the role'])(
    'mails into the folder and announces between processes, with %s',
    async (login) => {
      database = await cloneDatabase();
      const urls: Record<string, string> = login.startsWith('a login')
        ? { DATABASE_APP_URL: database.appUrl }
        : { DATABASE_URL: database.ownerUrl };
      const [one, other] = [await start(urls), await start(urls)];
      await Promise.all([one.startWork(), other.startWork()]);
      const heard: LiveEvent[] = [];
      other.deps.live.subscribe((event) => heard.push(event));
      const id = await mail(one);
      await until(async () => (await stateOf(one, id)) === 'sent');
      const files = readdirSync(path.join(storageDir, 'outbox'));
      expect(files.map((file) => path.extname(file)).sort()).toEqual(['.eml', '.txt']);
      const readable = files.find((file) => file.endsWith('.txt')) as string;
      expect(readFileSync(path.join(storageDir, 'outbox', readable), 'utf8')).toContain(LETTER.text);
      await until(() => heard.length === 1);
    },
  );

  it('sends at its start what was written while nobody worked', async () => {
    database = await cloneDatabase();
    const before = await start({ DATABASE_APP_URL: database.appUrl });
    const id = await mail(before);
    // The queue forgets, as after a restore of our own tables alone: the row is the truth.
    await before.deps.db.query('DELETE FROM pgboss.job');
    const after = await start({ DATABASE_APP_URL: database.appUrl });
    await after.startWork();
    await until(async () => (await stateOf(after, id)) === 'sent');
  });
});
