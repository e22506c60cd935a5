import { permeabilityPerSecond } from '#shared/compute/units.ts';
import type { EntityOf, UnitSystem } from '#shared/contract/document.ts';

/**
 * Seepage per run of dam, q = k·H·Nf/Nd·(B/L). `kPerSecond`: permeability in length units per second; `headLost`: H
 * in length units; `channels`, `drops`: Nf and Nd; `cellRatio`: width of a cell across the flow over its length along
 * it, 1 for squares. The answer is in length units squared per second: m³/s per m, or ft³/s per ft. Source:
 * Forchheimer's flow net, as in Casagrande (1937), Seepage through dams.
 */
export function seepagePerRun(
  kPerSecond: number,
  headLost: number,
  channels: number,
  drops: number,
  cellRatio: number,
): number {
  return (kPerSecond * headLost * channels * cellRatio) / drops;
}

/**
 * Permeability of the net in its length unit per second, √(kh·kv): that of the transformed section in which its cells are
 * squares. Null until entered. Source: Samsioe (1931); Casagrande (1937); Harr (1962), ch. 1.
 */
export function kPerSecondOf(permeability: EntityOf<'permeability'>, system: UnitSystem): number | null {
  const { k, kv, unit } = permeability;
  if (k === null) return null;
  return permeabilityPerSecond(kv === null ? k : Math.sqrt(k) * Math.sqrt(kv), unit, system);
}

/** More figures than this no counted net deserves. */
const MOST_FIGURES = 3;

/**
 * Significant figures that the permeability deserves, and so the seepage: k's own digits as entered, at most 3; 1
 * when k is only known within a factor of 2 or more. 1 while k is not entered.
 */
export function figuresOf(permeability: EntityOf<'permeability'>): number {
  const { k, factor } = permeability;
  if (k === null || (factor !== null && factor >= 2)) return 1;
  const digits = k.toExponential().split('e')[0]!.replace('.', '').replace(/0+$/, '').length;
  return Math.min(MOST_FIGURES, Math.max(1, digits));
}
