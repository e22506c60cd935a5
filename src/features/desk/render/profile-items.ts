import { fixedText } from '#client/lib/figures.ts';
import { profileText as text } from '#client/text/profiles.ts';
import { sectionPt } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { ProfileReading } from '#shared/contract/reading-quantities.ts';
import { DECIMALS, unitNames } from '#shared/text/unit-text.ts';
import { type ProfileDiagram, profileDiagram } from '../model/profile-diagram.ts';
import type { Profile } from '../model/profile-edits.ts';
import { COLOURS, type LineLook } from './line-look.ts';
import type { SceneItem } from './scene.ts';

const colour = COLOURS.point;
/** The line of a profile itself. */
export const PROFILE_LOOK: LineLook = { colour, widthPx: 1.8, dashPx: [12, 3, 3, 3], end: 'bar', hatchPx: 0 };
const UNFINISHED: LineLook = { ...PROFILE_LOOK, dashPx: [4, 3], end: 'ring' };
const CURVE: LineLook = { colour, widthPx: 1.6, dashPx: [], end: 'none', hatchPx: 0 };
const ORDINATES: LineLook = { ...CURVE, widthPx: 0.6 };
const TINT = { colour, alpha: 0.13, edged: false };

/** Diagrams already worked out: the picture is built anew at each zoom, the reading is not. */
const diagrams = new WeakMap<ProfileReading, ProfileDiagram | null>();

type About = {
  readonly document: FlowNetDocument;
  readonly reading: NetReading | null;
  readonly map: SectionMap | null;
  readonly chosen: boolean;
  /** Whether its pressures are named: those of several profiles would hide one another. */
  readonly named: boolean;
};

/** A profile on the sheet: its line, and the pore pressure along it as a diagram with its ends and maximum named. */
export function profileItems(id: string, value: Profile, about: About): SceneItem[] {
  const points = placesOnSheet(value, about.map);
  if (points.length === 0) return [];
  const look = value.finished ? PROFILE_LOOK : UNFINISHED;
  const axis: SceneItem = { id, shape: 'line', points, look, strong: about.chosen };
  const read = value.finished ? about.reading?.profiles.find((each) => each.id === id) : undefined;
  return [...(read === undefined ? [] : diagramItems(id, read, about)), axis];
}

function diagramItems(id: string, read: ProfileReading, { document, named }: About): SceneItem[] {
  const { unitSystem } = document;
  const diagram = diagramOf(read);
  if (diagram === null) return [];
  const { pressure: unit } = unitNames(unitSystem);
  const line = (name: string, all: ProfileDiagram['curves'], look: LineLook): SceneItem[] =>
    all.map((points, i) => ({ id: `${name} ${id} ${i}`, shape: 'line', points, look, strong: false }));
  return [
    {
      id: `pressures ${id}`,
      shape: 'area',
      outlines: diagram.outlines,
      look: TINT,
      strong: false,
    },
    ...line('ordinates', diagram.combs, ORDINATES),
    ...line('pressureCurve', diagram.curves, CURVE),
    ...(named ? diagram.figures : []).map(({ at, pressure, most }, i): SceneItem => {
      const figure = fixedText(pressure, DECIMALS[unitSystem].pressure);
      const words = most ? text.mark.most(figure, unit) : figure;
      const item = { id: `pressure ${id} ${i}`, shape: 'callout', at, text: words, colour } as const;
      return { ...item, strong: false, offsetPx: [0, 0] };
    }),
  ];
}

function diagramOf(read: ProfileReading): ProfileDiagram | null {
  const held = diagrams.get(read);
  if (held !== undefined) return held;
  const made = profileDiagram(read);
  diagrams.set(read, made);
  return made;
}

function placesOnSheet({ place }: Profile, map: SectionMap | null): readonly SheetPoint[] {
  if (place.on === 'sheet') return place.points;
  if (map === null) return [];
  const onSheet = ([offset, elevation]: readonly [number, number]): SheetPoint => {
    const [x, y] = map.toSheet(sectionPt(offset, elevation));
    return [x, y];
  };
  if (place.on === 'section') return place.points.map(onSheet);
  const [[x1, z1], [x2, z2]] = place.corners;
  const corners = [
    [x1, z1],
    [x2, z1],
    [x2, z2],
    [x1, z2],
    [x1, z1],
  ] as const;
  return corners.map(onSheet);
}
