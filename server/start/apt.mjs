import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import { faults, say } from './messages.mjs';
import { lastLines, runCommand } from './run-command.mjs';

export function isRoot() {
  return process.getuid?.() === 0;
}

/** Only root on a Debian-like system installs by itself; everybody else is told what to install. */
export function canInstall() {
  return isRoot() && existsSync('/usr/bin/apt-get');
}

/** @param {string} packageName */
export async function aptInstall(packageName) {
  say(`Installing the Debian package ${packageName}.`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  await aptGet(['update'], env, packageName);
  await aptGet(['install', '-y', '--no-install-recommends', packageName], env, packageName);
}

/** @param {string[]} args @param {NodeJS.ProcessEnv} env @param {string} packageName */
async function aptGet(args, env, packageName) {
  // Another apt-get may hold the lock for a while on a machine that has just started.
  const apt = await runCommand('apt-get', ['-o', 'DPkg::Lock::Timeout=300', ...args], { env });
  if (apt.code !== 0) throw faults.aptFailed(packageName, lastLines(apt.output, 2));
}

/** Keeps Debian's package from starting a cluster of its own, which nobody asked for. */
export function forbidDebianCluster() {
  const folder = '/etc/postgresql-common';
  const file = `${folder}/createcluster.conf`;
  if (existsSync(file)) return;
  mkdirSync(folder, { recursive: true });
  writeFileSync(file, 'create_main_cluster = false\n');
}
