import net from 'node:net';
import { errorCode, faults } from './messages.mjs';

export const DEFAULT_PORT = 4180;
export const DEFAULT_HOST = '127.0.0.1';

/** @param {NodeJS.ProcessEnv} env */
export function wantedPort(env) {
  if (env.PORT === undefined || env.PORT === '') return DEFAULT_PORT;
  const port = Number(env.PORT);
  if (!Number.isInteger(port) || port < 1 || port > 65535) throw faults.portMalformed(env.PORT);
  return port;
}

/** Fails with one sentence when the port cannot be had. @param {string} host @param {number} port */
export async function checkPortFree(host, port) {
  try {
    await openAndClose(host, port);
  } catch (error) {
    if (errorCode(error) === 'EADDRINUSE') throw faults.portBusy(host, port);
    throw faults.portRefused(host, port, errorCode(error) ?? String(error));
  }
}

/** @param {number | null} remembered taken again when it is still free */
export async function freeLoopbackPort(remembered) {
  if (remembered !== null) {
    try {
      return await openAndClose('127.0.0.1', remembered);
    } catch {
      return openAndClose('127.0.0.1', 0);
    }
  }
  return openAndClose('127.0.0.1', 0);
}

/** @param {string} host @param {number} port @returns {Promise<number>} */
function openAndClose(host, port) {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen({ host, port, exclusive: true }, () => {
      const address = server.address();
      server.close(() => resolve(typeof address === 'object' && address ? address.port : port));
    });
  });
}
