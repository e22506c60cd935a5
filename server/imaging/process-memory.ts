import { readFile } from 'node:fs/promises';

/** Resident bytes of a process, or 0 when it has ended. Linux; elsewhere 0, that is without a limit. */
export async function residentBytes(pid: number): Promise<number> {
  const status = await readFile(`/proc/${pid}/status`, 'utf8').catch(() => '');
  const kilobytes = /^VmRSS:\s+(\d+) kB/m.exec(status)?.[1];
  return kilobytes ? Number(kilobytes) * 1024 : 0;
}
