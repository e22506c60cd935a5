import { doubtAtPlace } from '#shared/compute/doubt/doubt-at-place.ts';
import type { ReadingDoubt } from '#shared/compute/doubt/point-doubt.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { straddlesWall } from '#shared/compute/net/hand-rule.ts';
import { type LieOfPlace, lieOf } from '#shared/compute/net/lie-of-place.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import { fieldAt, handAt } from '#shared/compute/net/two-readings.ts';

type Said = { readonly code: string; readonly text: string };

/** The head at a place of a net that need not be a reading point. */
export type PlaceHead =
  | {
      readonly status: 'read';
      /** Document length unit above the datum. */
      readonly totalHead: number;
      /** (∂h/∂offset, ∂h/∂elevation); null where the field could not be solved. */
      readonly gradient: readonly [number, number] | null;
      readonly doubtful: Said | null;
      /** Worked out when it is asked for: a mean over many places wants it at few of them. */
      readonly doubt: () => ReadingDoubt;
    }
  | { readonly status: 'abovePhreatic' }
  | ({ readonly status: 'withheld' } & Said);

/** Whose place it is: places of one tracing share its errors. `typed`: given in section coordinates. */
export type PlaceOrigin = { readonly id: string; readonly typed: boolean };

const ON_THIN_WALL: Said = {
  code: 'onThinWall',
  text: 'The place lies on a thin wall, nearer than the tracing can tell its two sides apart.',
};
const LINE_MISSING: Said = {
  code: 'lineMissing',
  text: 'An equipotential seems to be missing from the net; then the count and this figure with it are wrong.',
};
const BY_HAND: Said = {
  code: 'byHandOnly',
  text: 'The field could not be solved here: the figure is by hand’s rule.',
};

/**
 * The head at a place in working pixels by the same rules as at a reading point: by the field between the lines, by
 * hand's rule where the field could not be solved, nothing above the phreatic line, outside the net or inside a body.
 */
export function headAtPlace(at: SheetPx, ground: ReadingGround, origin: PlaceOrigin): PlaceHead {
  const lie = lieOf(at, ground);
  if (lie.in === 'air') return { status: 'abovePhreatic' };
  if (lie.in === 'nothing') return { status: 'withheld', code: lie.code, text: lie.text };
  const field = fieldAt(at, lie, ground);
  const found = field ?? handAt(at, lie, ground);
  if ('code' in found) return { status: 'withheld', code: found.code, text: found.text };
  if (!Number.isFinite(found.totalHead)) {
    return { status: 'withheld', code: 'notFinite', text: 'The head is too large to be worked out.' };
  }
  return {
    status: 'read',
    totalHead: found.totalHead,
    gradient: field !== null && 'gradient' in field ? finitePair(field.gradient) : null,
    doubtful: doubtAt(at, lie, ground, field === null),
    doubt: () =>
      doubtAtPlace(
        {
          ...origin,
          at,
          lie,
          elevationPlusMinus: null,
          fraction: fractionOf(found.totalHead, lie),
          gradient: field !== null && 'gradient' in field ? field.gradient : [0, 0],
          totalHead: found.totalHead,
          pressureHead: found.totalHead - ground.map.toSection(at)[1],
        },
        ground,
      ),
  };
}

/** Part of the interval passed, by the heads; the middle beside a line along which the head varies. */
function fractionOf(head: number, { before, after }: Extract<LieOfPlace, { in: 'strip' }>): number {
  if (before.head === null || after.head === null || before.head === after.head) return 0.5;
  return Math.min(1, Math.max(0, (before.head - head) / (before.head - after.head)));
}

function doubtAt(
  at: SheetPx,
  lie: Extract<LieOfPlace, { in: 'strip' }>,
  ground: ReadingGround,
  byHand: boolean,
): Said | null {
  if (straddlesWall(ground.strips, lie.strip, at, ground.walls, ground.slack)) return ON_THIN_WALL;
  if (ground.lacksLine) return LINE_MISSING;
  return byHand ? BY_HAND : null;
}

function finitePair(pair: readonly [number, number]): readonly [number, number] | null {
  return pair.every((part) => Number.isFinite(part)) ? pair : null;
}
