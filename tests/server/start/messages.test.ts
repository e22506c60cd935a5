import { mkdirSync, mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { claimStorage, isStartProcess } from '#server/start/already-running.mjs';
import { sourcesStamp } from '#server/start/client-build.mjs';
import { checkDiskSpace } from '#server/start/disk-space.mjs';
import { faults, inWords, sentenceFor } from '#server/start/messages.mjs';
import { checkPortFree, wantedPort } from '#server/start/ports.mjs';
import { choosePostgres, findPostgres } from '#server/start/postgres-find.mjs';
import { brokenFault, reasonIn } from '#server/start/postgres-postmaster.mjs';
import { lastLines } from '#server/start/run-command.mjs';
import { keptSessionSecret, makeSecrets, readSecrets } from '#server/start/secrets.mjs';
import { closingLine, countOf } from '#server/start/test-count.mjs';

let folder: string;
const at = (...parts: string[]) => path.join(folder, ...parts);

beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-start-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

describe('the port', () => {
  it('is 4180 unless PORT says otherwise', () => {
    expect(wantedPort({})).toBe(4180);
    expect(wantedPort({ PORT: '' })).toBe(4180);
    expect(wantedPort({ PORT: '8080' })).toBe(8080);
  });

  it.each(['0', '65536', 'http', '80.5', '-1'])('is refused as "%s", with an example', (value) => {
    expect(() => wantedPort({ PORT: value })).toThrow(/not a port number.*PORT=4181 npm start/);
  });

  it('that another program has is named in one sentence, with how to choose another', async () => {
    const other = net.createServer();
    await new Promise<void>((resolve) => other.listen(0, '127.0.0.1', resolve));
    const { port } = other.address() as net.AddressInfo;
    await expect(checkPortFree('127.0.0.1', port)).rejects.toThrow(
      `Port ${port} on 127.0.0.1 is used by another program. Choose another port, for example: PORT=${port + 1} npm start`,
    );
    await new Promise((resolve) => other.close(resolve));
    await expect(checkPortFree('127.0.0.1', port)).resolves.toBeUndefined();
  });
});

describe('the disk', () => {
  it('with less room than is kept free stops the start, with both amounts', () => {
    expect(() => checkDiskSpace(folder, { MIN_FREE_BYTES: '1e18' })).toThrow(
      /disk that holds .* is full: .* free, 1000000000\.0 GB needed\. Free some space/,
    );
    expect(() => checkDiskSpace(folder, { MIN_FREE_BYTES: '0' })).not.toThrow();
  });

  it('that runs full in the middle is told apart from a folder that may not be written', () => {
    const full = Object.assign(new Error('write'), { code: 'ENOSPC' });
    expect(sentenceFor(full, '/data')).toMatch(/^The disk ran full while writing below \/data\./);
    const closed = Object.assign(new Error('open'), { code: 'EACCES', path: '/data/secrets.json' });
    expect(sentenceFor(closed, '/data')).toMatch(/^\/data\/secrets\.json cannot be written by this user\./);
  });

  it('is spoken of in units that fit', () => {
    expect([inWords(536_870_912), inWords(2_500_000_000), inWords(999)]).toEqual([
      '536 MB',
      '2.5 GB',
      '0 MB',
    ]);
  });
});

describe('a second start', () => {
  it('is refused while the first is alive, and takes over from one that is gone', () => {
    const file = at('running.json');
    writeFileSync(file, JSON.stringify({ pid: 2 ** 22 + 1, address: 'http://127.0.0.1:4180' }));
    const claim = claimStorage(file);
    claim.setAddress('http://127.0.0.1:4999');
    claim.release();
    expect(() => claimStorage(file).release()).not.toThrow();
  });

  it('does not mistake another program with the same process number for a start', () => {
    // This process runs the tests; it is alive and no start script.
    expect(isStartProcess(process.ppid)).toBe(false);
    expect(isStartProcess('4180')).toBe(false);
  });

  it('says where the first one is', () => {
    expect(faults.alreadyRunning('http://127.0.0.1:4180', 77).message).toBe(
      'Tracehead is already running at http://127.0.0.1:4180 (process 77). Nothing was started.',
    );
  });
});

describe('the search for PostgreSQL', () => {
  function pretendInstalled(...majors: number[]) {
    for (const major of majors) {
      mkdirSync(at(String(major), 'bin'), { recursive: true });
      for (const name of ['initdb', 'pg_ctl', 'postgres', 'psql'])
        writeFileSync(at(String(major), 'bin', name), '');
    }
  }

  it('takes the newest, by number and not by letter', async () => {
    pretendInstalled(9, 15, 17);
    mkdirSync(at('18', 'bin'), { recursive: true });
    const found = await findPostgres(folder);
    expect(found.map((each) => each.major).sort((a, b) => a - b)).toEqual([9, 15, 17]);
    expect(choosePostgres(found, null)?.major).toBe(17);
  });

  it('takes the version that made the database, when there is one', async () => {
    pretendInstalled(15, 17);
    const found = await findPostgres(folder);
    expect(choosePostgres(found, 15)?.major).toBe(15);
    expect(choosePostgres(found, 16)).toBeNull();
  });

  it('passes over one that is too old', async () => {
    pretendInstalled(13);
    expect(choosePostgres(await findPostgres(folder), null)).toBeNull();
  });
});

describe('the reason for a database that does not start', () => {
  it("is the server's own last word", () => {
    writeFileSync(
      at('start.log'),
      '2026-12-01 12:00:00 UTC [1] LOG:  starting\n2026-12-01 12:00:01 UTC [1] PANIC:  could not locate a valid checkpoint record\n',
    );
    expect(reasonIn(at('start.log'), 'x')).toBe('could not locate a valid checkpoint record.');
  });

  it('is not taken for damage when the disk is full', () => {
    const full = 'could not write lock file "postmaster.pid": No space left on device.';
    expect(brokenFault('/data/postgres', full).message).toMatch(/^The disk ran full while writing below/);
    expect(brokenFault('/data/postgres', 'x.').message).toMatch(/^The database in .* does not start: x\./);
  });

  it('falls back to what was said elsewhere', () => {
    expect(reasonIn(at('none.log'), 'pg_ctl: could not start server\n')).toBe(
      'pg_ctl: could not start server.',
    );
  });
});

describe('the secrets', () => {
  it('are made once, readable by nobody else, and told apart from a damaged file', () => {
    const made = makeSecrets(at('secrets.json'));
    expect(readSecrets(at('secrets.json'))).toEqual(made);
    expect(new Set(Object.values(made)).size).toBe(4);
    writeFileSync(at('secrets.json'), '{"ownerPassword": "half');
    expect(readSecrets(at('secrets.json'))).toBeNull();
  });
});

describe('the key of the cookies beside a database of somebody else', () => {
  it('is made once and kept to itself', () => {
    const made = keptSessionSecret(at('session-secret'));
    expect(made.length).toBeGreaterThanOrEqual(32);
    expect(keptSessionSecret(at('session-secret'))).toBe(made);
    expect(statSync(at('session-secret')).mode & 0o777).toBe(0o600);
  });
});

describe("the stamp of the pages' sources", () => {
  it('changes with a content, a name and a new file, and with nothing else', () => {
    mkdirSync(at('src', 'deep'), { recursive: true });
    writeFileSync(at('src', 'deep', 'a.ts'), 'one');
    const first = sourcesStamp(folder);
    expect(sourcesStamp(folder)).toBe(first);
    writeFileSync(at('src', 'deep', 'a.ts'), 'two');
    const second = sourcesStamp(folder);
    expect(second).not.toBe(first);
    writeFileSync(at('index.html'), '');
    expect(sourcesStamp(folder)).not.toBe(second);
  });
});

describe('the count at the end of the tests', () => {
  it('adds up what passed and what failed', () => {
    const counts = [{ passed: 1, failed: 0 }, countOf({ numPassedTests: 40, numTotalTests: 42 }, 1)];
    expect(closingLine(counts)).toBe('41 passed, 2 failed');
  });

  it('counts a run without a report, without tests, or with a file that does not load as failed', () => {
    expect(countOf(null, 1)).toEqual({ passed: 0, failed: 1 });
    expect(countOf({ numPassedTests: 0, numTotalTests: 0 }, 0)).toEqual({ passed: 0, failed: 1 });
    expect(countOf({ numPassedTests: 5, numTotalTests: 5 }, 1)).toEqual({ passed: 5, failed: 1 });
  });
});

describe("a program's last words", () => {
  it('are that the disk is full, when it is, whatever came after', () => {
    const output =
      'FATAL: could not write: No space left on device\ninitdb: removing contents of data directory\n';
    expect(lastLines(output)).toMatch(/^the disk is full\. Free some space/);
  });

  it('are the error it names, without empty lines and stack frames', () => {
    expect(lastLines('first\nbad thing\n\n    at run (x.js:1)\n', 1)).toBe('bad thing');
    expect(
      lastLines("x.ts:1\nTypeError: no such thing\n  at run (x.ts:1) {\n  code: 'X'\n}\nNode.js v20\n"),
    ).toBe('TypeError: no such thing');
    expect(lastLines('', 1)).toBe('it gave no reason');
  });
});
