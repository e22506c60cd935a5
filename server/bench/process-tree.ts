import { readFileSync } from 'node:fs';

const POLL_MS = 50;

/** Whether the root itself counts, or only what it started. */
type Counted = 'whole' | 'children';

/** Resident bytes of a process and all that it started. Linux only; 0 elsewhere. */
function residentBytesOfTree(root: number, counted: Counted): number {
  const own = counted === 'whole' ? residentBytes(root) : 0;
  return childrenOf(root).reduce((sum, child) => sum + residentBytesOfTree(child, 'whole'), own);
}

/** Asked of the kernel by process: going through all processes of the machine would slow what is measured. */
function childrenOf(pid: number): number[] {
  return read(`/proc/${pid}/task/${pid}/children`).split(' ').filter(Boolean).map(Number);
}

function residentBytes(pid: number): number {
  return Number(/^VmRSS:\s+(\d+)/m.exec(read(`/proc/${pid}/status`))?.[1] ?? 0) * 1024;
}

/** Empty when the process has ended meanwhile. */
function read(file: string): string {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return '';
  }
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
