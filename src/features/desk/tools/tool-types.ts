import type { SheetPx } from '#shared/compute/frames.ts';
import type { LinearMap } from '#shared/compute/linear-map.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import type { Draft, HideableKind } from '../model/desk-state.ts';
import type { LocalOp } from '../model/document-ops.ts';
import type { DeskIntent } from '../model/intents.ts';
import type { Selection } from '../model/selection.ts';
import type { BoundaryKind, LineChoice, ToolId } from '../model/tool-choice.ts';
import type { SnapKind } from '../model/tool-overlay.ts';

export type Modifiers = { readonly shift: boolean; readonly alt: boolean; readonly ctrl: boolean };

/**
 * What happens on the sheet, whatever caused it: a mouse, a finger, a pen or a key. `press`, `move` and `release`
 * follow a pointer held down; `click` is a press let go without moving, `count` 2 for the second of a double click.
 */
export type ToolEvent =
  | { type: 'press' | 'move' | 'release'; at: SheetPx; keys: Modifiers }
  | { type: 'click'; at: SheetPx; keys: Modifiers; count: number }
  | { type: 'finish' | 'takeBack' | 'cancel' | 'remove' | 'abandonDrag' };

/** What is being dragged. */
export type DragTarget =
  | { readonly kind: 'vertex'; readonly lineId: string; readonly index: number }
  | { readonly kind: 'mark'; readonly id: string };

/** Where a tool stands. The line under way is in the document and named by the draft, not here. */
export type ToolState =
  | { readonly at: 'rest' }
  | {
      readonly at: 'dragging';
      readonly target: DragTarget;
      readonly pressedAt: SheetPx;
      /** Where the thing dragged was, so that it keeps its distance from the pointer. */
      readonly from: SheetPx;
      readonly moved: boolean;
      /** The line with a vertex put into it by the press; null when the vertex was there before. */
      readonly withInserted: DocumentEntity | null;
    };

export const AT_REST: ToolState = { at: 'rest' };

export type Balloon = { readonly id: string; readonly at: SheetPx };

export type ToolContext = {
  readonly document: FlowNetDocument;
  readonly selection: Selection;
  readonly draft: Draft | null;
  readonly tool: ToolId;
  /** The line the tool draws; null for a tool that draws none. */
  readonly choice: LineChoice | null;
  readonly hiddenKinds: readonly HideableKind[];
  readonly lockedKinds: readonly HideableKind[];
  readonly snapKinds: readonly SnapKind[];
  /** Sheet pixels to the section in which right angles are judged. */
  readonly working: LinearMap;
  readonly balloons: readonly Balloon[];
  readonly readOnly: boolean;
  /** Screen pixels per sheet pixel. */
  readonly zoom: number;
  /** How near something has to be to be meant, screen pixels: larger for a finger. */
  readonly reachPx: number;
  /** The set-out section; null before it is set out. */
  readonly map: SectionMap | null;
  newId(): string;
};

export type ToolCommand =
  | { do: 'run'; label: string; ops: LocalOp[] }
  | { do: 'select'; selection: Selection }
  | { do: 'draft'; draft: Draft | null }
  | { do: 'preview'; values: Record<string, DocumentEntity> }
  | { do: 'tool'; tool: ToolId; boundary: BoundaryKind | null }
  | { do: 'intent'; intent: DeskIntent };

export type ToolStep = { readonly state: ToolState; readonly commands: readonly ToolCommand[] };

/** Nothing happens and nothing changes. */
export function stay(state: ToolState): ToolStep {
  return { state, commands: [] };
}

export function rest(...commands: ToolCommand[]): ToolStep {
  return { state: AT_REST, commands };
}

/** True while a tool keeps the pointer to itself, so that the sheet is not panned. */
export function isGrabbing(state: ToolState): boolean {
  return state.at === 'dragging';
}
