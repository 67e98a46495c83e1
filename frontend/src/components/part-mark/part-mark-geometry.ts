export type WireKind = 'strand' | 'rod' | 'fibre';
export type MarkRim = 'solid' | 'dashed' | 'dotted';

export interface PartMarkShape {
  size: number;
  centre: { x: number; y: number };
  radius: number;
  strokeWidth: number;
  /** Closed outline of the section: the rim, and the clip of the ink. */
  rimPath: string;
  /** Top of the ink, in the mark's own units; null when there is no ink. */
  levelY: number | null;
  /** Wires of a strand, drawn at 48 px or more; never filled one by one. */
  wires: { x: number; y: number; radius: number }[];
  /** Short strokes across a fibre's rim, at more than 24 px. */
  hatches: { x1: number; y1: number; x2: number; y2: number }[];
  /** The flag of a due part: pole and cloth. */
  flag: { pole: { x1: number; y1: number; x2: number; y2: number }; cloth: string };
}

/** Eighths of the allowance that are used up: an eighth is filled when it is used, so only a full mark means all of it. */
export function eighthsUsed(allowanceUsed: number): number {
  // Half a thousandth of slack: 0.125 kept as 0.12499… by an earlier sum is still one eighth.
  return Math.max(0, Math.min(8, Math.floor(allowanceUsed * 8 + 0.004)));
}

/**
 * Where every line of the part mark lies, in a square of `size`. The section sits a little low and left in every state,
 * so that marks stand in line in a column whether or not one of them carries a flag.
 */
export function partMarkGeometry(kind: WireKind, size: number, eighths: number | null): PartMarkShape {
  const small = size <= 24;
  const strokeWidth = small ? 1.5 : size < 100 ? 1.5 : 2;
  const radius = size * 0.39;
  const centre = { x: size * 0.45, y: size * 0.55 };
  const rimPath = kind === 'strand' && !small ? scallops(centre, radius) : circle(centre, radius);
  return {
    size,
    centre,
    radius: round(radius),
    strokeWidth,
    rimPath,
    levelY: eighths === null || eighths <= 0 ? null : round(centre.y + radius - (2 * radius * eighths) / 8),
    wires: kind === 'strand' && size >= 48 ? wiresOfStrand(centre, radius) : [],
    hatches: kind === 'fibre' && !small ? rimHatches(centre, radius) : [],
    flag: flagAt(centre, radius, size),
  };
}

const OUTER_WIRES = 12;

/** Outline of twelve equal wires that touch in a ring: the outside of 1x19 strand. */
function scallops(centre: Point, radius: number): string {
  const halfStep = Math.PI / OUTER_WIRES;
  // Touching wires on a ring of radius c have radius c sin(halfStep), and c + that radius is the outside.
  const wireRadius = (radius * Math.sin(halfStep)) / (1 + Math.sin(halfStep));
  const touching = (radius - wireRadius) * Math.cos(halfStep);
  const at = (index: number) => polar(centre, touching, (2 * index - 1) * halfStep);
  const start = at(0);
  const arcs = Array.from({ length: OUTER_WIRES }, (_, index) => {
    const end = at(index + 1);
    return `A${round(wireRadius)} ${round(wireRadius)} 0 1 1 ${round(end.x)} ${round(end.y)}`;
  });
  return `M${round(start.x)} ${round(start.y)}${arcs.join('')}Z`;
}

function circle(centre: Point, radius: number): string {
  const left = round(centre.x - radius);
  const right = round(centre.x + radius);
  const y = round(centre.y);
  const r = round(radius);
  return `M${left} ${y}A${r} ${r} 0 1 1 ${right} ${y}A${r} ${r} 0 1 1 ${left} ${y}Z`;
}

/** The nineteen wires of 1x19: one, six round it, twelve round those; five wire diameters make the whole. */
function wiresOfStrand(centre: Point, radius: number): PartMarkShape['wires'] {
  const wireRadius = radius / 5;
  const ring = (count: number, distance: number) =>
    Array.from({ length: count }, (_, index) => polar(centre, distance, (2 * Math.PI * index) / count));
  return [centre, ...ring(6, 2 * wireRadius), ...ring(12, 4 * wireRadius)].map((place) => ({
    x: round(place.x),
    y: round(place.y),
    radius: round(wireRadius * 0.94),
  }));
}

/** Slanting strokes across a band at the rim, as fibre is hatched in a drawing. */
function rimHatches(centre: Point, radius: number): PartMarkShape['hatches'] {
  const count = 28;
  const slant = Math.PI / count;
  return Array.from({ length: count }, (_, index) => {
    const angle = (2 * Math.PI * index) / count;
    const inner = polar(centre, radius * 0.84, angle);
    const outer = polar(centre, radius, angle + slant);
    return { x1: round(inner.x), y1: round(inner.y), x2: round(outer.x), y2: round(outer.y) };
  });
}

function flagAt(centre: Point, radius: number, size: number): PartMarkShape['flag'] {
  const foot = polar(centre, radius, -Math.PI / 4);
  const top = size * 0.03;
  const x = Math.min(foot.x, size * 0.72);
  const drop = size * 0.3;
  const fly = size * 0.98;
  return {
    pole: { x1: round(x), y1: round(foot.y), x2: round(x), y2: round(top) },
    cloth: `M${round(x)} ${round(top)}L${round(fly)} ${round(top + drop / 2)}L${round(x)} ${round(top + drop)}Z`,
  };
}

interface Point {
  x: number;
  y: number;
}

function polar(centre: Point, distance: number, angle: number): Point {
  return { x: centre.x + distance * Math.cos(angle), y: centre.y + distance * Math.sin(angle) };
}

function round(value: number): number {
  return Math.round(value * 100) / 100;
}
