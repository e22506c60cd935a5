import { readFile } from 'node:fs/promises';
import { register } from 'node:module';
import { isMainThread } from 'node:worker_threads';

/*
 * Packages are handed to Node as they are. tsx looks through each file it loads for what it might have to rewrite,
 * which for the two of pdf.js takes longer than everything else the rendering process does before its first page.
 * Hooks registered later are asked first, so this stands before tsx.
 */
if (isMainThread) register(import.meta.url);

/** @type {import('node:module').LoadHook} */
export const load = async (url, context, nextLoad) => {
  const isPackage = url.startsWith('file:') && url.includes('/node_modules/') && url.endsWith('.mjs');
  if (!isPackage) return nextLoad(url, context);
  return { format: 'module', shortCircuit: true, source: await readFile(new URL(url)) };
};
