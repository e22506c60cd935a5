import { createWriteStream } from 'node:fs';
import { buffer } from 'node:stream/consumers';
import { pipeline } from 'node:stream/promises';
import { openPromise } from 'yauzl';
import { ZipFile } from 'yazl';

/** Everything in a ZIP file by name, in its order. */
export async function readZip(file: string): Promise<Map<string, Buffer>> {
  const zip = await openPromise(file, { lazyEntries: true, autoClose: false });
  const entries = new Map<string, Buffer>();
  for await (const entry of zip.eachEntry())
    entries.set(entry.fileName, await buffer(await zip.openReadStreamPromise(entry)));
  zip.close();
  return entries;
}

export async function writeZip(file: string, entries: ReadonlyMap<string, Buffer>): Promise<void> {
  const zip = new ZipFile();
  for (const [name, content] of entries) zip.addBuffer(content, name);
  zip.end();
  await pipeline(zip.outputStream, createWriteStream(file));
}
