import {
  pointOnMast,
  spreaderTip,
  type PositionGeometry,
  type RigGeometry,
  type RigPoint,
} from '@stayledger/shared/rig/geometry';

export interface DrawnPoint {
  x: number;
  y: number;
}

export interface DrawnStay {
  id: string;
  path: DrawnPoint[];
  /** Where the part mark stands: at the lower end, moved clear of its neighbours. */
  mark: DrawnPoint;
}

export interface ElevationDrawing {
  width: number;
  height: number;
  deck: DrawnPoint[];
  bowsprit: DrawnPoint[] | null;
  masts: DrawnPoint[][];
  spreaders: DrawnPoint[][];
  stays: DrawnStay[];
}

export interface StayToDraw {
  id: string;
  geometry: PositionGeometry;
}

interface Frame {
  width: number;
  /** Tallest the drawing may get; a tall rig is drawn narrower. */
  maxHeight: number;
  markSize: number;
}

/** A metre to starboard goes this far aft and down on paper, so that both sides of the rig are seen. */
const STARBOARD_AFT = 0.5;
const STARBOARD_DOWN = 0.22;
const DECK_STEPS = 16;

/**
 * The rig in oblique projection, seen from the starboard side with the bow to the left: profiles keep their true shape,
 * and port and starboard stand beside each other instead of over each other. Every part is given a place for its mark.
 */
export function elevationDrawing(
  rig: RigGeometry,
  stays: readonly StayToDraw[],
  { width, maxHeight, markSize }: Frame,
): ElevationDrawing {
  const spreaders = rig.masts.flatMap((mast) =>
    mast.spreaders.map((spreader) => [
      spreaderTip(mast, spreader, 'port'),
      pointOnMast(mast, spreader.heightM),
      spreaderTip(mast, spreader, 'starboard'),
    ]),
  );
  const masts = rig.masts.map((mast) => [pointOnMast(mast, 0), pointOnMast(mast, mast.heightM)]);
  const deck = deckOutline(rig);
  const bowsprit = rig.bowspritTip ? [{ aftM: 0, starboardM: 0, upM: 0 }, rig.bowspritTip] : null;
  const paths = stays.map(({ geometry: { lower, via, upper } }) => [lower, ...via, upper]);

  const all = [...masts, ...spreaders, deck, ...(bowsprit ? [bowsprit] : []), ...paths].flat().map(flattened);
  const left = Math.min(...all.map(({ x }) => x));
  const right = Math.max(...all.map(({ x }) => x));
  const top = Math.min(...all.map(({ y }) => y));
  const bottom = Math.max(...all.map(({ y }) => y));
  const edge = markSize;
  const scale = Math.min((width - 2 * edge) / (right - left), (maxHeight - 2 * edge) / (bottom - top));
  const slack = (width - (right - left) * scale) / 2;
  const onPaper = (point: RigPoint): DrawnPoint => {
    const { x, y } = flattened(point);
    return { x: round((x - left) * scale + slack), y: round((y - top) * scale + edge) };
  };

  const drawn = paths.map((path) => path.map(onPaper));
  const marks = placeMarks(
    drawn.map(([lower]) => lower),
    markSize,
    width,
  );
  const lowestMark = Math.max(0, ...marks.map(({ y }) => y));
  return {
    width,
    height: Math.ceil(Math.max((bottom - top) * scale + 2 * edge, lowestMark + markSize)),
    deck: deck.map(onPaper),
    bowsprit: bowsprit?.map(onPaper) ?? null,
    masts: masts.map((line) => line.map(onPaper)),
    spreaders: spreaders.map((line) => line.map(onPaper)),
    stays: stays.map(({ id }, index) => ({ id, path: drawn[index], mark: marks[index] })),
  };
}

/**
 * Centres for marks of one size near the given ends, none over another: each stands just below its end and gives way
 * downwards, in the order of the ends from the left. The order of the reply is that of the ends.
 */
export function placeMarks(ends: readonly DrawnPoint[], size: number, width: number): DrawnPoint[] {
  const gap = size * 1.1;
  const placed: DrawnPoint[] = [];
  const places = new Array<DrawnPoint>(ends.length);
  const order = ends.map((_, index) => index).sort((a, b) => ends[a].x - ends[b].x || ends[a].y - ends[b].y);
  for (const index of order) {
    const end = ends[index];
    const x = Math.min(Math.max(end.x, size / 2 + 1), width - size / 2 - 1);
    let y = end.y + size * 0.6;
    // Marks that could be in the way, from the top: what a step down clears is never met again, so one pass is enough.
    const column = placed
      .filter((other) => Math.abs(other.x - x) < gap)
      .sort((one, other) => one.y - other.y);
    for (const other of column) if (Math.abs(other.y - y) < gap) y = other.y + gap;
    const place = { x: round(x), y: round(y) };
    placed.push(place);
    places[index] = place;
  }
  return places;
}

/** Paper axes in metres: x to the right, y downwards. */
function flattened({ aftM, starboardM, upM }: RigPoint): DrawnPoint {
  return { x: aftM + STARBOARD_AFT * starboardM, y: -upM + STARBOARD_DOWN * starboardM };
}

/** Edge of the deck, closed: broadest a little aft of the middle, pointed at the bow, with a transom. */
function deckOutline({ deckLengthM, beamM }: RigGeometry): RigPoint[] {
  const transom = 0.6;
  const halfBeam = (t: number) => {
    // A sine that starts at the bow and is cut off where it has fallen to the breadth of the transom.
    const span = Math.PI - Math.asin(transom);
    return (beamM / 2) * Math.sin(t * span);
  };
  const side = (sign: 1 | -1) =>
    Array.from({ length: DECK_STEPS + 1 }, (_, step) => {
      const t = step / DECK_STEPS;
      return { aftM: t * deckLengthM, starboardM: sign * halfBeam(t), upM: 0 };
    });
  return [...side(1), ...side(-1).reverse()];
}

function round(value: number): number {
  return Math.round(value * 10) / 10;
}
