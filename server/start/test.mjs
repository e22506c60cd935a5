import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { ensureChromium, ensureWholeChromium } from './chromium.mjs';
import { live } from './life.mjs';
import { say } from './messages.mjs';
import { checkNode, ensurePackages } from './packages.mjs';
import { projectRoot, storageDirOf } from './paths.mjs';
import { ensurePostgres } from './postgres-find.mjs';
import { runCommand } from './run-command.mjs';
import { closingLine, countOf } from './test-count.mjs';

/**
 * Every check of the project, on a machine that may have nothing but Node. Given names of test projects
 * (unit, api, e2e, start), only those run, without the type check and the lint.
 */
await live(storageDirOf(process.env), async (life) => {
  const projects = process.argv.slice(2);
  checkNode(process.versions.node);
  await life.step(ensurePackages(projectRoot));
  await life.step(ensurePostgres());
  if (projects.length === 0 || projects.includes('e2e')) {
    await life.step(ensureChromium());
    await life.step(ensureWholeChromium());
  }

  const counts = [];
  if (projects.length === 0) {
    counts.push(await check('Type check', ['node_modules/typescript/bin/tsc', '--noEmit', '-p', '.']));
    life.check();
    counts.push(await check('Lint', ['node_modules/@biomejs/biome/bin/biome', 'check', '.']));
    life.check();
  }
  counts.push(await runVitest(projects));
  say(closingLine(counts));
  return counts.every((count) => count.failed === 0) ? 0 : 1;
});

/** One program that passes or fails as a whole. @param {string} title @param {string[]} args */
async function check(title, args) {
  say(`\n${title}`);
  const outcome = await runCommand(process.execPath, args, { cwd: projectRoot, show: true });
  say(outcome.code === 0 ? `${title}: passed` : `${title}: failed`);
  return outcome.code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

/** @param {string[]} projects */
async function runVitest(projects) {
  say('\nTests');
  const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-report-'));
  const report = path.join(folder, 'report.json');
  const args = ['node_modules/vitest/vitest.mjs', 'run', '--reporter=default', '--reporter=json'];
  const wanted = projects.map((name) => `--project=${name}`);
  const outcome = await runCommand(process.execPath, [...args, `--outputFile.json=${report}`, ...wanted], {
    cwd: projectRoot,
    show: true,
  });
  const count = countOf(readReport(report), outcome.code);
  rmSync(folder, { recursive: true, force: true });
  return count;
}

/** A run that broke down leaves no report. @param {string} file */
function readReport(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}
