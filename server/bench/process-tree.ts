import { readdirSync, readFileSync } from 'node:fs';

const POLL_MS = 50;

/** Whether the root itself counts, or only what it started. */
type Counted = 'whole' | 'children';

/** Resident bytes of a process and all that it started. Linux only; 0 elsewhere. */
function residentBytesOfTree(root: number, counted: Counted): number {
  const processes = readProcesses();
  const family = new Set([root]);
  // A child's number may be lower than its parent's, so one pass in the order of numbers is not enough.
  for (let before = 0; before < family.size; ) {
    before = family.size;
    for (const each of processes) if (family.has(each.parent)) family.add(each.pid);
  }
  if (counted === 'children') family.delete(root);
  return processes.reduce((sum, each) => sum + (family.has(each.pid) ? each.bytes : 0), 0);
}

function readProcesses(): Array<{ pid: number; parent: number; bytes: number }> {
  const names = process.platform === 'linux' ? readdirSync('/proc').filter((name) => /^\d+$/.test(name)) : [];
  return names.flatMap((name) => {
    try {
      const status = readFileSync(`/proc/${name}/status`, 'utf8');
      const field = (key: string) => Number(new RegExp(`^${key}:\\s+(\\d+)`, 'm').exec(status)?.[1] ?? 0);
      return [{ pid: Number(name), parent: field('PPid'), bytes: field('VmRSS') * 1024 }];
    } catch {
      // It ended between the listing and the reading.
      return [];
    }
  });
}

/** Runs `work` and tells the highest sum of resident memory seen meanwhile, in bytes. */
export async function peakOfTree<T>(
  root: number,
  work: () => Promise<T>,
  counted: Counted = 'whole',
): Promise<{ result: T; bytes: number }> {
  let bytes = residentBytesOfTree(root, counted);
  const timer = setInterval(() => {
    bytes = Math.max(bytes, residentBytesOfTree(root, counted));
  }, POLL_MS);
  try {
    const result = await work();
    return { result, bytes };
  } finally {
    clearInterval(timer);
  }
}
