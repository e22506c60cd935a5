import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { scheduleCsv } from '#shared/text/schedule-csv.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const root = path.resolve(import.meta.dirname, '..', '..', '..');
const { net, pxPerUnit } = EXACT_NETS[0]!;
const document = exactNetDocument(net, {
  pxPerUnit,
  readings: [{ at: net.placeAt(3.4, 1.5), clicked: true }],
});
const text = JSON.stringify(document, null, 2);
let folder = '';

beforeAll(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'read-net-'));
});
afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

function run(name: string, content: string | null, ...options: string[]) {
  const file = path.join(folder, name);
  if (content !== null) writeFileSync(file, content);
  return spawnSync('npm', ['run', '--silent', 'read-net', '--', file, ...options], {
    cwd: root,
    encoding: 'utf8',
  });
}

describe('npm run read-net', () => {
  it('asks for a file and says when it cannot be read', () => {
    expect(run('absent.json', null)).toMatchObject({ status: 2, stdout: '' });
    expect(run('absent.json', null).stderr).toContain('cannot be read');
  });

  it('names the line of broken JSON', () => {
    const { status, stderr } = run('broken.json', '{\n  "format": "tracehead/flow-net",\n  oops\n}');
    expect(status).toBe(1);
    expect(stderr).toMatch(/broken\.json, line 3: This is not JSON/);
  });

  it('names the line and the field of a wrong value', () => {
    const line = text.split('\n').findIndex((row) => row.includes('"gammaW"')) + 1;
    const { status, stderr } = run('wrong.json', text.replace(/"gammaW": [\d.]+/, '"gammaW": "heavy"'));
    expect(status).toBe(1);
    expect(stderr).toMatch(
      new RegExp(`wrong\\.json, line ${line}, entities\\..*\\.value\\.gammaW: .*number`),
    );
  });

  it('prints the same figures as the library, as JSON and as CSV', () => {
    const reading = readNet(document);
    const json = run('net.json', text);
    expect(json.status).toBe(0);
    expect(JSON.parse(json.stdout)).toEqual(JSON.parse(JSON.stringify(reading)));
    expect(run('net.json', text, '--csv').stdout).toBe(scheduleCsv(document, reading));
  });
});
