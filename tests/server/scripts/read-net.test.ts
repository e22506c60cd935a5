import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { netCsv } from '#shared/text/net-csv.ts';
import { scheduleCsv } from '#shared/text/schedule-csv.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { FIRST_DOCUMENT_TEXT } from '#tests/support/first-version/first-version.ts';

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

const script = path.join(root, 'server/scripts/read-net.ts');

function run(name: string, content: string | null, ...options: string[]) {
  const file = path.join(folder, name);
  if (content !== null) writeFileSync(file, content);
  return spawnSync(process.execPath, ['--import', 'tsx', script, file, ...options], {
    cwd: root,
    encoding: 'utf8',
  });
}

describe('npm run read-net', () => {
  it('says when there is no such file', () => {
    const { status, stdout, stderr } = spawnSync(
      'npm',
      ['run', '--silent', 'read-net', '--', path.join(folder, 'absent.json')],
      { cwd: root, encoding: 'utf8' },
    );
    expect([status, stdout]).toEqual([2, '']);
    expect(stderr).toContain('cannot be read');
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
    const csv = run('net.json', text, '--csv').stdout;
    expect(csv).toBe(netCsv(document, reading));
    expect(csv.startsWith(scheduleCsv(document, reading))).toBe(true);
  });

  it('asks for one file and knows no other option', () => {
    expect(run('net.json', text, '--xml')).toMatchObject({ status: 2, stdout: '' });
    expect(run('net.json', text, 'second.json').stderr).toContain('Give one net file');
  });

  it('reads a file of the first version', () => {
    const { status, stdout } = run('first.json', FIRST_DOCUMENT_TEXT);
    expect([status, JSON.parse(stdout).state]).toEqual([0, 'read']);
  });

  it('prints what is missing of a net that is not finished, and no figure', () => {
    const unfinished = text.replace(/"headwater": [-\d.]+/, '"headwater": null');
    const { status, stdout } = run('unfinished.json', unfinished);
    const printed = JSON.parse(stdout);
    expect([status, printed.state, printed.quantities.headLost]).toEqual([0, 'unfinished', null]);
    expect(printed.findings.map((found: { weight: string }) => found.weight)).toContain('missing');
  });
});
