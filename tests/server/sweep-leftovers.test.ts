import { existsSync, mkdirSync, mkdtempSync, rmSync, utimesSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { sweepLeftovers } from '#server/storage/sweep-leftovers.ts';

let storageDir: string;
const at = (...parts: string[]) => path.join(storageDir, ...parts);
const NOW = new Date('2026-12-01T12:00:00Z');
const hoursAgo = (hours: number) => new Date(NOW.getTime() - hours * 3_600_000);

beforeEach(() => {
  storageDir = mkdtempSync(path.join(os.tmpdir(), 'tracehead-sweep-'));
});
afterEach(() => rmSync(storageDir, { recursive: true, force: true }));

it('does nothing in a storage folder that is new', async () => {
  await expect(sweepLeftovers(storageDir, NOW)).resolves.toBeUndefined();
});

it('removes uploads and renderings a day after their process was killed, and nothing else', async () => {
  mkdirSync(at('incoming'));
  mkdirSync(at('work', 'old-run'), { recursive: true });
  mkdirSync(at('sha256'));
  for (const file of ['incoming/old', 'incoming/under-way', 'sha256/kept']) writeFileSync(at(file), 'x');
  for (const old of ['incoming/old', 'work/old-run', 'sha256/kept'])
    utimesSync(at(old), hoursAgo(25), hoursAgo(25));
  utimesSync(at('incoming/under-way'), hoursAgo(1), hoursAgo(1));
  await sweepLeftovers(storageDir, NOW);
  expect([at('incoming/old'), at('work/old-run')].filter((file) => existsSync(file))).toEqual([]);
  expect([at('incoming/under-way'), at('sha256/kept')].every((file) => existsSync(file))).toBe(true);
});
