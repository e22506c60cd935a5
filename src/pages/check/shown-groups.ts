import { differs, type GroupBeside } from '#shared/compute/compare-figures/figures-beside.ts';

/** Places of profiles shown one by one; a grid has thousands, and the file has them all. */
export const MOST_PLACES = 100;

export interface ShownGroups {
  groups: readonly GroupBeside[];
  /** Places of profiles that are left out because all their figures are equal, and because there are too many. */
  equalPlaces: number;
  morePlaces: number;
}

/** What the table lists: everything but places of profiles in which nothing differs; on request nothing that is equal. */
export function shownGroups(all: readonly GroupBeside[], onlyDiffering: boolean): ShownGroups {
  const places = all.filter(({ kind }) => kind === 'sample');
  const differing = places.filter((group) => group.figures.some(differs));
  const listed = new Set(differing.slice(0, MOST_PLACES));
  const groups = all.filter((group) => group.kind !== 'sample' || listed.has(group));
  return {
    groups: (onlyDiffering ? groups.map(withDiffering) : groups).filter(({ figures }) => figures.length > 0),
    equalPlaces: places.length - differing.length,
    morePlaces: differing.length - listed.size,
  };
}

const withDiffering = (group: GroupBeside) => ({ ...group, figures: group.figures.filter(differs) });
