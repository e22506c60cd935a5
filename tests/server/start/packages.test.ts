import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { checkNode, ensurePackages, installedMatchesLock, lockStamp } from '#server/start/packages.mjs';

let root: string;
const at = (...parts: string[]) => path.join(root, ...parts);

function writeLock(file: string, versions: Record<string, { version: string; optional?: boolean }>) {
  mkdirSync(path.dirname(file), { recursive: true });
  writeFileSync(file, JSON.stringify({ packages: { '': { name: 'x' }, ...versions } }));
}

beforeEach(() => {
  root = mkdtempSync(path.join(os.tmpdir(), 'tracehead-packages-'));
});
afterEach(() => rmSync(root, { recursive: true, force: true }));

describe('the check of Node', () => {
  it.each(['18.20.4', '20.18.9', '9.11.0'])('refuses %s and says what is needed', (version) => {
    expect(() => checkNode(version)).toThrow(`this is Node ${version}. Install a newer Node`);
  });

  it.each(['20.19.0', '20.20.2', '22.1.0', '24.0.0'])('takes %s', (version) => {
    expect(() => checkNode(version)).not.toThrow();
  });
});

describe('the check of the packages', () => {
  it('finds packages that are what the lock file asks for', () => {
    writeLock(at('package-lock.json'), { 'node_modules/a': { version: '1.0.0' } });
    writeLock(at('node_modules', '.package-lock.json'), { 'node_modules/a': { version: '1.0.0' } });
    expect(installedMatchesLock(root)).toBe(true);
  });

  it('notices another version, a missing package, and no packages at all', () => {
    writeLock(at('package-lock.json'), { 'node_modules/a': { version: '1.0.1' } });
    expect(installedMatchesLock(root)).toBe(false);
    writeLock(at('node_modules', '.package-lock.json'), { 'node_modules/a': { version: '1.0.0' } });
    expect(installedMatchesLock(root)).toBe(false);
    writeLock(at('node_modules', '.package-lock.json'), {});
    expect(installedMatchesLock(root)).toBe(false);
  });

  it('misses no optional package that is for another kind of machine', () => {
    writeLock(at('package-lock.json'), { 'node_modules/b': { version: '1.0.0', optional: true } });
    writeLock(at('node_modules', '.package-lock.json'), {});
    expect(installedMatchesLock(root)).toBe(true);
  });

  it('leaves a stamp, so that the next start need not look again', async () => {
    writeLock(at('package-lock.json'), { 'node_modules/a': { version: '1.0.0' } });
    writeLock(at('node_modules', '.package-lock.json'), { 'node_modules/a': { version: '1.0.0' } });
    await ensurePackages(root);
    expect(readFileSync(at('node_modules', '.tracehead-lock'), 'utf8')).toBe(lockStamp(root));
  });

  it('takes another lock file for a reason to look again', () => {
    writeLock(at('package-lock.json'), { 'node_modules/a': { version: '1.0.0' } });
    const before = lockStamp(root);
    writeLock(at('package-lock.json'), { 'node_modules/a': { version: '1.0.1' } });
    expect(lockStamp(root)).not.toBe(before);
  });
});
