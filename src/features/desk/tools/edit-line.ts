import { editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { extend } from './edit-extend.ts';
import { joinLines } from './edit-join.ts';
import { isOn, otherLineAt } from './edit-others.ts';
import type { EditResult, LineThing } from './edit-result.ts';
import { splitNear } from './edit-split.ts';
import { trim } from './edit-trim.ts';
import type { Modifiers, ToolContext } from './tool-types.ts';

/** What a click at a place would do to the chosen line. */
export function editAt(
  op: 'split' | 'join' | 'trim' | 'extend',
  line: LineThing,
  at: SheetPx,
  keys: Modifiers,
  context: ToolContext,
): EditResult {
  if (line.value.points.length < 2) return { refusal: editRefusals.tooFewPoints };
  if (op === 'split') return splitNear(line, at, context);
  const other = otherLineAt(line.id, at, context);
  if (op === 'trim') return trim(line, other, at, keys, context);
  if (op === 'extend') return extend(line, other, at, context);
  if (other !== null) return joinLines(line, other, context);
  return { refusal: isOn(line, at, context) ? editRefusals.joinSelf : editRefusals.noLineThere };
}
