import { makeFinding } from '#shared/compute/findings.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';

/**
 * Refuses a headwater boundary that lies downstream of every outlet by what is said of the section: then the side or the
 * levels have been taken for one another, and in the second case every head of the net is that of the other end. `upstream` is the side as displayed, null until said; shapes in
 * base-raster pixels, left and right along the section's own horizontal.
 */
export function questionUpstream(
  upstream: EntityOf<'setOut'>['upstream'],
  potentials: readonly Potential[],
  map: SectionMap,
): Finding[] {
  if (upstream === null) return [];
  const placesOf = (role: Potential['role']) =>
    potentials.filter((potential) => potential.role === role).map(({ shape }) => alongOf(shape.box, map));
  const entries = placesOf('headwater');
  const outlets = placesOf('outlet');
  if (entries.length === 0 || outlets.length === 0) return [];
  const contradicted =
    upstream === 'left'
      ? Math.min(...entries) > Math.max(...outlets)
      : Math.max(...entries) < Math.min(...outlets);
  if (!contradicted) return [];
  return [
    makeFinding(
      'wrong',
      'upstreamDisagrees',
      `Upstream is said to be at the ${upstream}, but the headwater boundary lies on the other side of the outlet. Correct that side, or which boundary carries which water; until then no figure is given.`,
      { cell: 'headwater' },
    ),
  ];
}

/** Place of the middle of a box along the section's horizontal, growing to the right as displayed. */
function alongOf(
  box: { minX: number; maxX: number; minY: number; maxY: number },
  { up }: SectionMap,
): number {
  return (-up[1] * (box.minX + box.maxX) + up[0] * (box.minY + box.maxY)) / 2;
}
