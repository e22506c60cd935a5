import { parentPort } from 'node:worker_threads';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';

/** A thread of the server that reads nets, one after another. Says that it is ready before the first. */
const port = parentPort;
if (!port) throw new Error('This file runs as a thread of the server.');
port.on('message', (document: FlowNetDocument) => port.postMessage(readNet(document)));
port.postMessage('ready');
