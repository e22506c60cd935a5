import { halfWidth } from '#shared/compute/doubt/contributions.ts';
import type { ReadingDoubt } from '#shared/compute/doubt/point-doubt.ts';
import { type SectionPt, sheetPx } from '#shared/compute/frames.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import type { PreparedNet } from '#shared/compute/prepare-net.ts';
import { overburdenAt } from '#shared/compute/profiles/overburden.ts';
import { headAtPlace, type PlaceHead, type PlaceOrigin } from '#shared/compute/profiles/place-head.ts';
import { type ProfilePlace, type ProfilePlaces, placesOf } from '#shared/compute/profiles/profile-places.ts';
import { type ReadSample, upliftOn } from '#shared/compute/profiles/uplift-on-base.ts';
import { pressureRatio } from '#shared/compute/quantities/gradients.ts';
import type { SoilGround } from '#shared/compute/soils/soil-ground.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import type { ProfileReading, ProfileSample } from '#shared/contract/reading-quantities.ts';

const UNFINISHED = {
  code: 'netUnfinished',
  text: 'The net is unfinished: nothing is read along the profile. The findings say what is missing.',
};

const NOT_FINITE = {
  code: 'notFinite',
  text: 'The profile reaches farther than can be worked out. Check its places and the known points.',
};

/**
 * Reads every finished profile of a document, in order: at each place total head, pressure head, pore pressure
 * u = γw(h − z) and r_u; under a base the resultant of the pressures besides. Above the phreatic line the pressure is 0
 * and the status says so; where nothing can be read the reason is given. `prepared` is null, or not finished, while
 * nothing may be read: then a profile has no places. `tailwater`: level of the tailwater, null without one. Never throws.
 */
export function profilesRead(
  document: FlowNetDocument,
  prepared: PreparedNet | null,
  tailwater: number | null,
): ProfileReading[] {
  return entitiesOf(prepared?.working ?? document, 'profile')
    .filter(({ value }) => value.finished)
    .sort((a, b) => a.value.order - b.value.order || (a.id < b.id ? -1 : 1))
    .map(({ id, value }) => {
      const { name, order, use } = value;
      const about = { id, name, order, use };
      if (prepared === null || !prepared.finished)
        return { ...about, samples: [], remark: UNFINISHED, uplift: null };
      const places = placesOf(value, prepared.frame.map);
      const origin = { id, typed: value.place.on !== 'sheet' };
      const read = places.places.map((place) => sampleAt(place, origin, prepared));
      const samples = read.map(({ sample }) => sample);
      if (!samples.every(hasPlace)) return { ...about, samples: [], remark: NOT_FINITE, uplift: null };
      const uplift = use === 'base' ? upliftOn(read, prepared.ground, tailwater) : null;
      return { ...about, samples, remark: remarkOn(places, value), uplift };
    });
}

function hasPlace({ distance, offset, elevation, at }: ProfileSample): boolean {
  return [distance ?? 0, offset, elevation, ...at].every(Number.isFinite);
}

function remarkOn({ places, coarser }: ProfilePlaces, value: EntityOf<'profile'>): ProfileReading['remark'] {
  if (places.length === 0)
    return { code: 'profileEmpty', text: 'The profile has no place that can be read. Draw it again.' };
  if (!coarser) return null;
  return {
    code: 'profileCoarser',
    text: `At a spacing of ${value.spacing ?? 0} the profile would have too many places: it is read at a wider one.`,
  };
}

function sampleAt({ at, distance }: ProfilePlace, origin: PlaceOrigin, prepared: PreparedNet): ReadSample {
  const { frame, ground, soils } = prepared;
  const onNet = frame.map.toSheet(at);
  const [x, y] = frame.toSheet(onNet);
  const [offset, elevation] = at;
  const head = headAtPlace(onNet, ground, origin);
  const place = { distance, offset, elevation, at: [x, y] as [number, number] };
  const doubt = head.status === 'read' ? head.doubt() : null;
  return { sample: { ...place, ...figuresAt(at, head, doubt, ground, soils) }, doubt };
}

type Figures = Omit<ProfileSample, 'distance' | 'offset' | 'elevation' | 'at'>;

const NO_FIGURES = {
  reason: null,
  doubtful: null,
  totalHead: null,
  totalHeadPlusMinus: null,
  pressureHead: null,
  porePressure: null,
  porePressurePlusMinus: null,
  ru: null,
};

function figuresAt(
  at: SectionPt,
  head: PlaceHead,
  doubt: ReadingDoubt | null,
  ground: ReadingGround,
  soils: SoilGround,
): Figures {
  if (head.status === 'withheld') {
    return { ...NO_FIGURES, status: 'withheld', reason: { code: head.code, text: head.text } };
  }
  if (head.status === 'abovePhreatic') {
    const reason = { code: 'abovePhreatic', text: 'above the phreatic line, suction left out' };
    return { ...NO_FIGURES, status: 'abovePhreatic', reason, porePressure: 0, ru: 0 };
  }
  const pressureHead = head.totalHead - at[1];
  const porePressure = ground.gammaW * pressureHead;
  if (!Number.isFinite(porePressure)) {
    const text = 'The pressure is too large to be worked out.';
    return { ...NO_FIGURES, status: 'withheld', reason: { code: 'notFinite', text } };
  }
  const [x, y] = ground.map.toSheet(at);
  const overburden = overburdenAt(sheetPx(x, y), ground, soils);
  return {
    status: 'read',
    reason: null,
    doubtful: head.doubtful,
    totalHead: head.totalHead,
    totalHeadPlusMinus: finiteOrNull(halfWidth(doubt?.totalHead ?? [])),
    pressureHead,
    porePressure,
    porePressurePlusMinus: finiteOrNull(halfWidth(doubt?.porePressure ?? [])),
    ru: overburden === null ? null : pressureRatio(porePressure, overburden),
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
