import { readFileSync } from 'node:fs';
import { parseNetFile } from '#server/services/net-file.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { netCsv } from '#shared/text/net-csv.ts';

/**
 * Reads a net file without server or database: `npm run read-net -- net.json [--csv]`. Prints the readings, the
 * quantities and the net check; ends with 0, with 1 when the file is no net, with 2 when there is none to read.
 */
function main(args: readonly string[]): number {
  const options = args.filter((arg) => arg.startsWith('--'));
  const files = args.filter((arg) => !arg.startsWith('--'));
  const file = files[0];
  if (file === undefined || files.length > 1 || options.some((option) => option !== '--csv')) {
    return fail(['Give one net file: npm run read-net -- net.json [--csv]'], 2);
  }
  const text = textOf(file);
  if (text === null) return fail([`${file} cannot be read. Check the name and that the file is there.`], 2);
  const parsed = parseNetFile(text);
  if ('faults' in parsed) {
    return fail(
      parsed.faults.map(
        ({ line, field, message }) => `${file}, line ${line}${field ? `, ${field}` : ''}: ${message}`,
      ),
      1,
    );
  }
  const reading = readNet(parsed.document);
  const out = options.includes('--csv')
    ? netCsv(parsed.document, reading)
    : `${JSON.stringify(reading, null, 2)}\n`;
  process.stdout.write(out);
  return 0;
}

function textOf(file: string): string | null {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return null;
  }
}

function fail(lines: readonly string[], code: number): number {
  process.stderr.write(`${lines.join('\n')}\n`);
  return code;
}

process.exitCode = main(process.argv.slice(2));
