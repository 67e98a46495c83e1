/** Extremes of one channel per stretch of time: equal-length arrays, instants as epoch milliseconds, ascending. */
export interface Envelope {
  atMs: readonly number[];
  lowKn: readonly number[];
  highKn: readonly number[];
}

export interface TraceScale {
  /** Place of an instant on the time axis, in pixels. */
  xOf: (atMs: number) => number;
  lowKn: number;
  highKn: number;
  height: number;
}

/** A stretch without data this many times longer than the usual spacing is drawn as a hole, not bridged. */
const HOLE_SPACINGS = 2.5;

/** Index ranges [first, last] of the envelope between which no data are missing. */
export function unbrokenStretches(atMs: readonly number[]): [number, number][] {
  if (atMs.length === 0) return [];
  const steps = atMs.slice(1).map((at, index) => at - atMs[index]);
  const usual = [...steps].sort((a, b) => a - b)[Math.floor(steps.length / 2)] ?? 0;
  const stretches: [number, number][] = [];
  let first = 0;
  for (let index = 1; index < atMs.length; index += 1) {
    if (usual > 0 && atMs[index] - atMs[index - 1] > HOLE_SPACINGS * usual) {
      stretches.push([first, index - 1]);
      first = index;
    }
  }
  stretches.push([first, atMs.length - 1]);
  return stretches;
}

/**
 * The envelope as one SVG path: along the highest loads, back along the lowest, closed, once per unbroken stretch.
 * Every extreme is a corner of the band, so none is lost whatever the width.
 */
export function tracePath(envelope: Envelope, scale: TraceScale): string {
  const spanKn = scale.highKn - scale.lowKn || 1;
  const x = (index: number): string => scale.xOf(envelope.atMs[index]).toFixed(1);
  const y = (kn: number): string => (scale.height - ((kn - scale.lowKn) / spanKn) * scale.height).toFixed(1);
  const pieces: string[] = [];
  for (const [first, last] of unbrokenStretches(envelope.atMs)) {
    const top: string[] = [];
    const bottom: string[] = [];
    for (let index = first; index <= last; index += 1) {
      top.push(`${x(index)} ${y(envelope.highKn[index])}`);
      bottom.unshift(`${x(index)} ${y(envelope.lowKn[index])}`);
    }
    pieces.push(`M${[...top, ...bottom].join('L')}Z`);
  }
  return pieces.join('');
}

/** Index of the stretch of time nearest to an instant; -1 for an empty envelope. */
export function nearestIndex(atMs: readonly number[], wantedMs: number): number {
  let best = -1;
  for (let index = 0; index < atMs.length; index += 1) {
    if (best < 0 || Math.abs(atMs[index] - wantedMs) < Math.abs(atMs[best] - wantedMs)) best = index;
  }
  return best;
}

/** Round values for a load axis that holds both ends: steps of 1, 2 or 5 times a power of ten. */
export function loadTicks(low: number, high: number, wanted = 4): number[] {
  const span = high - low;
  if (!(span > 0)) return [low];
  const raw = span / wanted;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= raw) ?? raw;
  const ticks: number[] = [];
  for (let index = Math.floor(low / step); index <= Math.ceil(high / step); index += 1)
    ticks.push(index * step);
  // index * step of a decimal step leaves tails such as 0.30000000000000004.
  return ticks.map((tick) => Number(tick.toPrecision(12)));
}
