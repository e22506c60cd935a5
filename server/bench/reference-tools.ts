import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { aptInstall, canInstall } from '#server/start/apt.mjs';
import { runCommand } from '#server/start/run-command.mjs';

/** Installs a Debian package unless its program is there. */
export async function ensureProgram(
  program: string,
  versionFlag: string,
  packageName: string,
): Promise<void> {
  if ((await runCommand(program, [versionFlag])).code === 0) return;
  if (!canInstall()) throw new Error(`the reference needs ${program}: sudo apt-get install ${packageName}`);
  await aptInstall(packageName);
}

async function run(program: string, args: string[]): Promise<void> {
  const { code, output } = await runCommand(program, args);
  if (code !== 0) throw new Error(`${program}: ${output}`);
}

/** libvips' own way from a picture to tiles of the same size as ours. */
const dzsave = (input: string, folder: string) =>
  run('vips', ['dzsave', input, path.join(folder, 'out'), '--tile-size', '512', '--overlap', '0']);

/** From a file to tiles by other programs: a PDF is drawn at 300 dpi first. */
export async function tilesByOthers(input: string, folder: string): Promise<void> {
  if (!input.endsWith('.pdf')) return dzsave(input, folder);
  await run('pdftoppm', ['-r', '300', '-singlefile', input, path.join(folder, 'page')]);
  return dzsave(path.join(folder, 'page.ppm'), folder);
}

/** Runs `use` with the bytes as a file in a folder of its own, which goes afterwards. */
export async function withFile<T>(
  bytes: Buffer,
  name: string,
  use: (file: string, folder: string) => Promise<T>,
): Promise<T> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-reference-'));
  try {
    const file = path.join(folder, name);
    writeFileSync(file, bytes);
    return await use(file, folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
