import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino } from 'pino';
import { createApp } from './app.ts';
import { compose } from './composition.ts';
import { ConfigError, readConfig } from './config/config.ts';
import { onStopAsked, orderlyStop, STOP_GRACE_MS } from './orderly-stop.ts';

const LONGEST_REQUEST_MS = 60 * 60 * 1000;

/** Tells the start script, when one is waiting, where the server listens or why it does not. */
const report = (message: { address: string } | { fault: string }) => process.send?.(message);

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const logger = pino({ level: config.logLevel });
  const product = await compose(config, logger);
  // Node's own limit for a whole request is five minutes and would cut a slow upload of a large scan; an upload
  // that falls silent is ended by its route.
  const server = createServer({ requestTimeout: LONGEST_REQUEST_MS }, createApp(product.deps));
  const stopServing = orderlyStop(server);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(config.port, config.host, resolve);
  });
  await product.startWork();
  const { port } = server.address() as AddressInfo;
  const address = `http://${config.host}:${port}`;
  logger.info({ address }, 'listening');
  report({ address });

  onStopAsked(async () => {
    logger.info('stopping');
    await stopServing(STOP_GRACE_MS);
    await product.stop(STOP_GRACE_MS);
    logger.info('stopped');
    process.exit(0);
  });
}

main().catch((error: unknown) => {
  const fault = error instanceof Error ? error.message : String(error);
  // Settings are the reader's own and need no stack; the start script says what it is told.
  if (!(error instanceof ConfigError)) console.error(error);
  else if (!process.send) console.error(fault);
  if (!process.send) process.exit(1);
  // The process may end only after the start script has been told.
  process.send({ fault }, () => process.exit(1));
});
