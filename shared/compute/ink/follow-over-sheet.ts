import { thinned } from '#shared/compute/geometry/thin.ts';
import { followOnMap, GRIP } from '#shared/compute/ink/follow-ink.ts';
import { type InkMap, type InkWindow, inkMapOf } from '#shared/compute/ink/ink-window.ts';

type Place = readonly [x: number, y: number];
/** A part of a level, `[left, top, width, height]` in that level's pixels. */
export type LevelFrame = readonly [number, number, number, number];

/** A scan at its own size, level 0, and halved again and again. */
export type InkSheet = {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Number of the smallest level. */
  readonly halvings: number;
  /** Grey values of a part of a level, which lies within it. */
  window(level: number, frame: LevelFrame): Promise<InkWindow>;
};

export type FollowQuestion = {
  readonly from: Place;
  readonly to: Place;
  /** How near a stroke has to be to a click to be meant, sheet pixels. */
  readonly grip: number;
  /** False for a first look: a long way is then told from a smaller level only. */
  readonly fine: boolean;
};

/**
 * A line along the ink in sheet pixels. `found` is false where most of it runs over bare paper, `fine` is false of a look
 * at a smaller level that has still to be followed at full size.
 */
export type FollowedPath = {
  readonly points: readonly Place[];
  readonly found: boolean;
  readonly fine: boolean;
};

/** The part of a line that has to run on ink: a dashed line has gaps of half its length. */
const LEAST_ON_INK = 0.5;
/** Room about the two clicks into which the line may bend, as a part of their distance, and its bounds in pixels. */
const ROOM = 0.25;
const ROOM_PX = [48, 1200] as const;
/** Windows are cut at multiples of this, so that a pointer that moves asks for the same one again. */
const GRID = 128;
/** The largest window worked at once: what takes longer is looked at in a smaller level first. */
const MOST_SIDE = 1500;
const MOST_PIXELS = 1_000_000;
/** A line found in a smaller level is found again at full size in pieces about so long, sheet pixels. */
const PIECE = 320;
const MAPS_KEPT = 4;

/** Follows the ink of one sheet, keeping the last maps of ink. */
export function createInkFollower(sheet: InkSheet): {
  follow(question: FollowQuestion): Promise<FollowedPath>;
} {
  const maps = new Map<string, Promise<InkMap>>();

  function mapOf(level: number, frame: LevelFrame): Promise<InkMap> {
    const key = `${level} ${frame.join(' ')}`;
    const kept = maps.get(key) ?? sheet.window(level, frame).then(inkMapOf);
    maps.delete(key);
    maps.set(key, kept);
    // A window that could not be fetched is asked for again with the next question.
    kept.catch(() => maps.delete(key));
    const oldest = maps.keys().next().value;
    if (maps.size > MAPS_KEPT && oldest !== undefined) maps.delete(oldest);
    return kept;
  }

  /** Follows within one window of a level; places in sheet pixels. */
  async function within(
    level: number,
    places: readonly Place[],
    room: number,
    [from, to]: readonly [Place, Place],
    grip: number,
  ) {
    const scale = 2 ** level;
    const frame = frameAbout(sheet, level, places, room);
    const map = await mapOf(level, frame);
    const inside = ([x, y]: Place): Place => [x / scale - frame[0], y / scale - frame[1]];
    const { line, onInk } = followOnMap(map, inside(from), inside(to), Math.max(GRIP / 2, grip / scale));
    return {
      points: line.map(([x, y]): Place => [(x + frame[0]) * scale, (y + frame[1]) * scale]),
      onInk,
    };
  }

  /** Over the finest level that is fit and there: while a sheet is being prepared its finer tiles are not. */
  async function firstLook(from: Place, to: Place, grip: number) {
    for (let level = levelFor(sheet, from, to); ; level += 1) {
      const found = within(level, [from, to], roomFor(from, to), [from, to], grip);
      const look = await found.catch((error: unknown) => {
        if (level >= sheet.halvings) throw error;
        return null;
      });
      if (look !== null) return { level, ...look };
    }
  }

  return {
    async follow({ from, to, grip, fine }) {
      const { level, ...first } = await firstLook(from, to, grip);
      const done = level === 0 || fine;
      if (first.onInk < LEAST_ON_INK) return { points: [from, to], found: false, fine: done };
      if (level === 0 || !fine) return { points: first.points, found: true, fine: done };
      const points: Place[] = [];
      for (const piece of piecesOf(first.points, PIECE)) {
        const start = points.at(-1) ?? piece[0]!;
        // Where the smaller level put a place it may be off by a few of its own pixels.
        const reach = points.length === 0 ? Math.max(grip, 2 ** level) : 2 ** (level + 1);
        const room = 8 + 6 * 2 ** level;
        const found = await within(0, piece, room, [start, piece.at(-1)!], reach).catch(() => null);
        if (found === null) return { points: first.points, found: true, fine: true };
        points.push(...(points.length === 0 ? found.points : found.points.slice(1)));
      }
      return { points: thinned(points as [number, number][], 0.3), found: true, fine: true };
    },
  };
}

function roomFor(from: Place, to: Place): number {
  const distance = Math.hypot(to[0] - from[0], to[1] - from[1]);
  return Math.min(ROOM_PX[1], Math.max(ROOM_PX[0], ROOM * distance));
}

/** The largest level whose window about two clicks is small enough to be worked at once. */
function levelFor(sheet: InkSheet, from: Place, to: Place): number {
  for (let level = 0; level < sheet.halvings; level += 1) {
    const [, , width, height] = frameAbout(sheet, level, [from, to], roomFor(from, to));
    if (Math.max(width, height) <= MOST_SIDE && width * height <= MOST_PIXELS) return level;
  }
  return sheet.halvings;
}

/** The part of a level about some places, with room, widened to the grid and cut at the sheet's edge. */
export function frameAbout(
  { widthPx, heightPx }: Pick<InkSheet, 'widthPx' | 'heightPx'>,
  level: number,
  places: readonly Place[],
  room: number,
): LevelFrame {
  const scale = 2 ** level;
  const along = (axis: 0 | 1, size: number): [number, number] => {
    const most = Math.ceil(size / scale);
    const low = Math.min(...places.map((place) => place[axis]));
    const high = Math.max(...places.map((place) => place[axis]));
    const start = Math.floor((low - room) / scale / GRID) * GRID;
    const end = Math.ceil((high + room) / scale / GRID) * GRID;
    const from = Math.min(most - 1, Math.max(0, start));
    return [from, Math.max(1, Math.min(most, end) - from)];
  };
  const [left, width] = along(0, widthPx);
  const [top, height] = along(1, heightPx);
  return [left, top, width, height];
}

/** A line cut into pieces about so long, each beginning where the one before ends. */
function piecesOf(points: readonly Place[], length: number): Place[][] {
  const pieces: Place[][] = [];
  let piece: Place[] = [points[0]!];
  let walked = 0;
  for (let i = 1; i < points.length; i += 1) {
    const [a, b] = [points[i - 1]!, points[i]!];
    const whole = Math.hypot(b[0] - a[0], b[1] - a[1]);
    for (let t = length - walked; t < whole; t += length) {
      const cut: Place = [a[0] + ((b[0] - a[0]) * t) / whole, a[1] + ((b[1] - a[1]) * t) / whole];
      piece.push(cut);
      pieces.push(piece);
      piece = [cut];
    }
    walked = (walked + whole) % length;
    piece.push(b);
  }
  pieces.push(piece);
  return pieces;
}
