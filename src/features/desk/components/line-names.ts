import { lineText } from '#client/text/desk-forms.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';

/** How a traced line is called in a table: by its name, else by its kind. */
export function lineNameOf(document: FlowNetDocument, id: string): string {
  const value = document.entities[id]?.value;
  if (value?.kind !== 'line') return '–';
  return value.name || lineText.kinds[value.line];
}
