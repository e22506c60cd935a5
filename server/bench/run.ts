import { writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { archive } from './archive-bench.ts';
import type { Bench, BenchRow } from './bench.ts';
import { firstLoad } from './first-load.ts';
import { firstView } from './first-view-bench.ts';
import { independentSolution } from './independent-bench.ts';
import { inkFollow } from './ink-follow.ts';
import { mailLatency } from './mail-latency.ts';
import { noteLatency } from './note-latency.ts';
import { pageMemory } from './page-memory.ts';
import { panFrame } from './pan-frame.ts';
import { dragVertex, panFrameE600 } from './pan-frame-e600.ts';
import { fieldSolve, readingError, reread200, wholeNet60 } from './reading-bench.ts';
import { register } from './register-bench.ts';
import { renderMemory } from './render-memory.ts';
import { scheduleApi } from './schedule-api.ts';
import { sheetPdf } from './sheet-pdf.ts';
import { tableOf } from './table.ts';
import { uploadGroupFour, uploadGroupFourE, uploadJpeg, uploadPdf } from './upload-bench.ts';

/** npm run bench [-- --only NAME --json FILE] */
const benches: readonly Bench[] = [
  uploadGroupFour,
  uploadJpeg,
  uploadGroupFourE,
  uploadPdf,
  firstView,
  renderMemory,
  panFrame,
  panFrameE600,
  dragVertex,
  pageMemory,
  firstLoad,
  scheduleApi,
  noteLatency,
  register,
  mailLatency,
  independentSolution,
  reread200,
  wholeNet60,
  fieldSolve,
  readingError,
  inkFollow,
  sheetPdf,
  archive,
];

const { values: options } = parseArgs({
  options: { only: { type: 'string', multiple: true }, json: { type: 'string' } },
});

const chosen = chooseBenches(options.only);
const rows: BenchRow[] = [];
const failed: string[] = [];
for (const bench of chosen) {
  console.log(`${bench.name}: ${bench.about}`);
  try {
    rows.push(...(await bench.run()));
  } catch (error) {
    // One that cannot be measured on this machine says so and leaves the others their turn.
    failed.push(bench.name);
    console.error(`${bench.name} was not measured: ${error instanceof Error ? error.message : error}`);
  }
}
console.log(`\n${tableOf(rows)}`);
if (options.json) writeFileSync(options.json, `${JSON.stringify(rows, null, 2)}\n`);
process.exit(failed.length > 0 ? 1 : 0);

function chooseBenches(names: string[] | undefined): readonly Bench[] {
  if (!names) return benches;
  const found = benches.filter((bench) => names.includes(bench.name));
  if (found.length < names.length) {
    console.error(`There are these benches: ${benches.map((bench) => bench.name).join(', ')}.`);
    process.exit(2);
  }
  return found;
}
