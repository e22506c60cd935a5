import { editLabels, editRefusals } from '#client/text/editing-lines.ts';
import {
  type DocumentEntity,
  entitiesOf,
  type FlowNetDocument,
  type SheetPoint,
} from '#shared/contract/document.ts';
import { selectSeveral } from '../model/selection.ts';
import {
  chosenThings,
  isOffTheSheet,
  movedValue,
  putAll,
  refusalToChange,
  refused,
  type Thing,
} from './edit-things.ts';
import { placeOf } from './pick.ts';
import { AT_REST, rest, type ToolCommand, type ToolContext, type ToolStep } from './tool-types.ts';

/** A copy lies so far to the right of and below the original, screen pixels, that both are seen. */
const BESIDE_PX = 16;

/** Keeps what is chosen, to be pasted. */
export function copyChosen(context: ToolContext): ToolStep {
  const refusal = refusalToCopy(context);
  return refusal === null ? rest({ do: 'keep', values: copyable(context) }) : refused(refusal);
}

/** Puts what was copied beside the original; pasted again, beside the copy. */
export function paste(context: ToolContext): ToolStep {
  if (context.readOnly) return refused(editRefusals.readOnly);
  if (context.draft !== null) return refused(editRefusals.drawing);
  const values = context.copied ?? [];
  if (values.length === 0) return refused(editRefusals.nothingCopied);
  return putCopies(values, beside(context), context, true);
}

/** Copies what is chosen by a step in sheet pixels, or beside itself; what was copied before is kept. */
export function duplicate(context: ToolContext, by: SheetPoint = beside(context)): ToolStep {
  const refusal = refusalToCopy(context);
  return refusal === null ? putCopies(copyable(context), by, context, false) : refused(refusal);
}

function refusalToCopy(context: ToolContext): string | null {
  if (context.selection.kind === 'knownPoint') return editRefusals.knownPointAlone;
  return refusalToChange(context);
}

function beside({ zoom }: ToolContext): SheetPoint {
  return [BESIDE_PX / zoom, BESIDE_PX / zoom];
}

/** What is chosen as it can be copied: a point typed by its coordinates by its place on the sheet. */
function copyable(context: ToolContext): DocumentEntity[] {
  return chosenThings(context).flatMap(({ value }) => {
    if (value.kind !== 'readingPoint' || value.place.on === 'sheet') return movedValue(value, [0, 0]) ?? [];
    const at = placeOf(value, context.map);
    return at === null
      ? []
      : [{ ...value, place: { on: 'sheet' as const, at: [at[0], at[1]] as SheetPoint } }];
  });
}

function putCopies(
  values: readonly DocumentEntity[],
  by: SheetPoint,
  context: ToolContext,
  keep: boolean,
): ToolStep {
  const copies: Thing[] = [];
  for (const value of values) {
    const moved = movedValue(value, by);
    if (moved !== null) copies.push({ id: context.newId(), value: asCopy(moved, context.document, copies) });
  }
  if (copies.length === 0) return refused(editRefusals.typedStays);
  if (copies.some(isOffTheSheet)) return refused(editRefusals.offTheSheet);
  const copied = copies.map(({ value }) => value);
  const kept: ToolCommand[] = keep ? [{ do: 'keep', values: copied }] : [];
  return {
    state: AT_REST,
    commands: [
      { do: 'run', label: editLabels.copied(copied), ops: putAll(copies) },
      { do: 'select', selection: selectionOf(copies, context.document) },
      ...kept,
    ],
  };
}

/** The copies are in the document by the time they are chosen. */
function selectionOf(copies: readonly Thing[], document: FlowNetDocument) {
  const entities = { ...document.entities };
  for (const { id, value } of copies) entities[id] = { id, version: 0, value };
  return selectSeveral(
    copies.map(({ id }) => id),
    { ...document, entities },
  );
}

/**
 * A copy carries neither the name nor the count of its original, as two lines of one count would contradict each other;
 * and what lies elsewhere is no longer the line that was taken from the computed net.
 */
function asCopy(value: DocumentEntity, document: FlowNetDocument, before: readonly Thing[]): DocumentEntity {
  if (value.kind === 'line') {
    const head = value.line === 'equipotential' ? null : value.head;
    const origin = value.origin === 'adopted' ? 'traced' : value.origin;
    return { ...value, name: '', drops: null, head, origin };
  }
  if (value.kind !== 'readingPoint' && value.kind !== 'profile') return value;
  const alike = [
    ...entitiesOf(document, value.kind).map((each) => each.value),
    ...before.flatMap((each) => (each.value.kind === value.kind ? [each.value] : [])),
  ];
  const order = 1 + alike.reduce((last, each) => Math.max(last, each.order), 0);
  const name = freeNameLike(value.name, new Set(alike.map((each) => each.name)));
  return value.kind === 'readingPoint'
    ? { ...value, name, order, measured: null }
    : { ...value, name, order };
}

/** "P3" becomes the next of its letters that is not used; a name without a number gets one. */
function freeNameLike(name: string, used: ReadonlySet<string>): string {
  if (name === '') return name;
  const stem = /\d$/.test(name) ? name.replace(/\d+$/, '') : `${name} `;
  let n = 2;
  while (used.has(`${stem}${n}`)) n += 1;
  return `${stem}${n}`;
}
