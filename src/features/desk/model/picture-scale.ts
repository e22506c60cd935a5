import { type SheetPx, sectionPt } from '#shared/compute/frames.ts';
import { mapped } from '#shared/compute/linear-map.ts';
import { linearAt, type PlaneMap } from '#shared/compute/plane-map.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { UnitSystem } from '#shared/contract/document.ts';

/** Pixels of the picture for each unit of the section: along the level, and upwards. */
export type PictureScale = { readonly level: number; readonly up: number };

/** Scales that differ by less draw the same bar. */
const SAME_SCALE = 0.002;

/** The scale about a place of the sheet, as it is seen through a map or as it is drawn. */
export function pictureScaleAt(map: SectionMap, seenAs: PlaneMap | null, at: SheetPx): PictureScale {
  const [offset, elevation] = map.toSection(at);
  const lengthOf = (dOffset: number, dElevation: number) => {
    const to = map.toSheet(sectionPt(offset + dOffset, elevation + dElevation));
    const [dx, dy] = [to[0] - at[0], to[1] - at[1]];
    return Math.hypot(...(seenAs === null ? [dx, dy] : mapped(linearAt(seenAs, at[0], at[1]), dx, dy)));
  };
  return { level: lengthOf(1, 0), up: lengthOf(0, 1) };
}

export function scalesDiffer({ level, up }: PictureScale): boolean {
  return Math.abs(up / level - 1) > SAME_SCALE;
}

/** The greatest of 1, 2 and 5 times a power of ten that is not above a length. */
export function roundLength(length: number): number {
  const power = 10 ** Math.floor(Math.log10(length));
  const step = [5, 2, 1].find((each) => each * power <= length * (1 + 1e-9)) ?? 1;
  return Number((step * power).toPrecision(3));
}

const UNIT_MM: Record<UnitSystem, number> = { SI: 1000, US: 304.8 };

/** n of the scale 1:n of a drawing on which a unit of the section is so many millimetres long. */
export function scaleNumber(mmPerUnit: number, system: UnitSystem): number {
  return UNIT_MM[system] / mmPerUnit;
}

/** Millimetres on paper for each unit of the section at the scale 1:n. */
export function mmPerUnitAt(n: number, system: UnitSystem): number {
  return UNIT_MM[system] / n;
}

/** Scales of a scale rule: of the metric ones 1:1, 1:2, 1:2.5 and 1:5; an inch for so many feet, in hundreds too. */
const ROUND: Record<UnitSystem, readonly number[]> = {
  SI: [1, 2, 2.5, 5],
  US: [1.2, 2.4, 3.6, 4.8, 6, 7.2],
};

/** The next round scales at which what fits at 1:`least` fits too, the largest drawing first. */
export function roundScales(least: number, system: UnitSystem, count = 4): number[] {
  const power = 10 ** Math.floor(Math.log10(least) - 1);
  const all = [1, 10, 100, 1000].flatMap((tens) =>
    ROUND[system].map((step) => Number((step * tens * power).toPrecision(3))),
  );
  return all.filter((n) => n >= least * (1 - 1e-9)).slice(0, count);
}
