import type { SheetPx } from '#shared/compute/frames.ts';
import type { FollowedPath } from '#shared/compute/ink/follow-over-sheet.ts';
import type { LinearMap } from '#shared/compute/linear-map.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { DocumentEntity, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { ClickedPlace, ClickedPlaces } from '../model/clicked-places.ts';
import type { CrossingLook } from '../model/crossing-client.ts';
import type { Draft, HideableKind } from '../model/desk-state.ts';
import type { LocalOp } from '../model/document-ops.ts';
import type { DrawingWay } from '../model/drawing-way.ts';
import type { GuidesByOwner } from '../model/guides.ts';
import type { InkLook, InkReach } from '../model/ink-client.ts';
import type { DeskIntent } from '../model/intents.ts';
import type { PendingEdit } from '../model/pending-edit.ts';
import type { Ruler } from '../model/ruler.ts';
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

/**
 * What came of following the ink for a click: `fixed` when its end has to stay where it was clicked; `path` is null
 * where the scan could not be read.
 */
export type FollowedEvent = InkReach & {
  type: 'followed';
  lineId: string;
  fixed: boolean;
  path: FollowedPath | null;
};

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
    }
  /** All that is chosen follows the pointer; `by`: how far, sheet pixels. */
  | {
      readonly at: 'moving';
      readonly pressedAt: SheetPx;
      readonly by: SheetPoint;
      readonly moved: boolean;
    }
  /** All that is chosen has been moved by arrow keys of which one is still held. */
  | { readonly at: 'nudging'; readonly by: SheetPoint }
  /** A rectangle is drawn about what is to be chosen. */
  | { readonly at: 'framing'; readonly from: SheetPx; readonly to: SheetPx }
  /** A stroke is drawn freehand. */
  | { readonly at: 'sketching'; readonly places: readonly SheetPx[] };

export const AT_REST: ToolState = { at: 'rest' };

export type Balloon = {
  readonly id: string;
  readonly at: SheetPx;
  /** The line that the note is about; left out where it is about none. */
  readonly lineId?: string;
};

export type ToolContext = {
  readonly document: FlowNetDocument;
  readonly selection: Selection;
  readonly draft: Draft | null;
  /** What the next click answers; left out or null while nothing is asked for. */
  readonly pendingEdit?: PendingEdit | null;
  /** What was copied last. */
  readonly copied?: readonly DocumentEntity[];
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
  /** How lines come about between one click and the next. */
  readonly way: DrawingWay;
  readonly clicked: Pick<ClickedPlaces, 'among'>;
  /** What is shown over the sheet besides the net. */
  readonly guides: GuidesByOwner;
  /** The newest look at where the ink runs; null before the first. */
  readonly inkLook: InkLook | null;
  /** What is being measured. */
  readonly ruler: Ruler;
  /** The newest look for a crossing of drawn lines; null before the first and where none are wanted. */
  readonly crossingLook: CrossingLook | null;
  /** Screen pixels per sheet pixel. */
  readonly zoom: number;
  /** How near something has to be to be meant, screen pixels: larger for a finger. */
  readonly reachPx: number;
  /** Less than this is no move but an unsteady hand, screen pixels; left out, as of a mouse. */
  readonly steadyPx?: number;
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
  | { do: 'intent'; intent: DeskIntent }
  | { do: 'ruler'; ruler: Ruler }
  | { do: 'ask'; edit: PendingEdit | null }
  | { do: 'notice'; text: string }
  | { do: 'keep'; values: readonly DocumentEntity[] }
  /** Remembers where a line was clicked. */
  | { do: 'clicked'; lineId: string; places: readonly ClickedPlace[] }
  /** Asks where the ink runs; a `followed` event answers. */
  | { do: 'follow'; lineId: string; reach: InkReach; fixed: boolean };

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
  return ['dragging', 'moving', 'framing', 'sketching'].includes(state.at);
}
