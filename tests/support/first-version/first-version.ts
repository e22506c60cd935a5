import { readFileSync } from 'node:fs';
import path from 'node:path';

const textOf = (name: string) => readFileSync(path.join(import.meta.dirname, name), 'utf8');

/** A net's document as version 1 of the product saved it: the text of its file. */
export const FIRST_DOCUMENT_TEXT = textOf('document.json');
/** The same document as parsed JSON. */
export const firstDocument = (): Record<string, unknown> => JSON.parse(FIRST_DOCUMENT_TEXT);
/** What engine 1 read off it and froze. */
export const firstReading = (): Record<string, unknown> & {
  points: Array<{ id: string; porePressure: number | null; totalHead: number | null }>;
} => JSON.parse(textOf('reading.json'));
