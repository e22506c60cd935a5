import { csvUrl } from '#client/lib/csv-url.ts';
import { apiUrl } from '#client/lib/http.ts';
import type { NetDownload } from '../components/download-menu.tsx';

/** Where a file of a net is answered. */
export function netDownloadUrl(netId: string, what: NetDownload): string {
  if (what === 'traces') return apiUrl(`/nets/${netId}/traces.dxf`);
  if (what === 'net') return apiUrl(`/nets/${netId}/document`);
  return csvUrl(`/nets/${netId}/schedule.csv`);
}
