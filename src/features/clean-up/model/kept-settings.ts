import * as z from 'zod/mini';
import { AS_SCANNED, type RenditionSettings, renditionSettings } from '#shared/contract/renditions.ts';

const keyOf = (sheetId: string) => `clean-up ${sheetId}`;

/** What was set for a sheet and not used yet, in this tab. */
export function keptSettings(sheetId: string): RenditionSettings | null {
  try {
    const parsed = z.safeParse(
      renditionSettings,
      JSON.parse(sessionStorage.getItem(keyOf(sheetId)) ?? 'null'),
    );
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}

/** Keeps what is set through a reload; null forgets it. */
export function keepSettings(sheetId: string, settings: RenditionSettings | null): void {
  try {
    if (settings === null) sessionStorage.removeItem(keyOf(sheetId));
    else sessionStorage.setItem(keyOf(sheetId), JSON.stringify(settings));
  } catch {
    // A browser that keeps nothing loses no more than the sliders.
  }
}

export function isAsScanned(settings: RenditionSettings): boolean {
  return JSON.stringify({ ...AS_SCANNED, ...settings }) === JSON.stringify(AS_SCANNED);
}
