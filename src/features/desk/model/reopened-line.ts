import type { FlowNetDocument } from '#shared/contract/document.ts';
import { type ToolId, toolForLine } from './tool-choice.ts';

/**
 * The line or profile that a step taken back or done again has left unfinished, when the tool that draws it is in hand: it can
 * be gone on with at once. Null when there is none.
 */
export function reopenedLine(before: FlowNetDocument, after: FlowNetDocument, tool: ToolId): string | null {
  for (const [id, { value }] of Object.entries(after.entities)) {
    if (value.kind !== 'line' && value.kind !== 'profile') continue;
    if (value.finished || before.entities[id]?.value === value) continue;
    if ((value.kind === 'profile' ? 'profile' : toolForLine(value).tool) === tool) return id;
  }
  return null;
}
