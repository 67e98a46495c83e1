import { unbrokenStretches, type Envelope } from './trace-path';

export interface TimeStretch {
  fromMs: number;
  toMs: number;
}

/** A stretch of recorded time with its place on the axis, in pixels. */
export interface PlacedStretch extends TimeStretch {
  fromX: number;
  toX: number;
}

export interface BrokenTimeScale {
  stretches: PlacedStretch[];
  /** Instants between two stretches fall into the middle of the break. */
  xOf(atMs: number): number;
  /** The instant at a place of the axis; a place in a break gives the nearer end. */
  msOf(x: number): number;
}

/** Pauses shorter than this share of the recorded time are left standing as holes. */
const SHORT_PAUSE = 0.02;
const BREAK_PX = 16;
/** However many pauses there are, the breaks together take no more of the width than this. */
const BREAKS_SHARE = 0.25;

/** Time in which any of the channels was recorded, long pauses left out, ascending. */
export function recordedStretches(envelopes: readonly Envelope[]): TimeStretch[] {
  const all = envelopes
    .flatMap(({ atMs }) =>
      unbrokenStretches(atMs).map(([first, last]) => ({ fromMs: atMs[first], toMs: atMs[last] })),
    )
    .sort((a, b) => a.fromMs - b.fromMs);
  const joined: TimeStretch[] = [];
  for (const stretch of all) {
    const last = joined[joined.length - 1];
    if (last !== undefined && stretch.fromMs <= last.toMs) last.toMs = Math.max(last.toMs, stretch.toMs);
    else joined.push({ ...stretch });
  }
  const recordedMs = joined.reduce((sum, { fromMs, toMs }) => sum + toMs - fromMs, 0);
  const kept: TimeStretch[] = [];
  for (const stretch of joined) {
    const last = kept[kept.length - 1];
    if (last !== undefined && stretch.fromMs - last.toMs <= SHORT_PAUSE * recordedMs)
      last.toMs = stretch.toMs;
    else kept.push({ ...stretch });
  }
  return kept;
}

/**
 * A time axis with its long pauses cut out, so that a week of day sails is not drawn as a few hairs. Lengths are true
 * within and among the stretches; every cut is marked by whoever draws it.
 */
export function brokenTimeScale(stretches: readonly TimeStretch[], width: number): BrokenTimeScale {
  const recordedMs = stretches.reduce((sum, { fromMs, toMs }) => sum + toMs - fromMs, 0);
  const breaks = Math.max(0, stretches.length - 1);
  const breakPx = breaks === 0 ? 0 : Math.min(BREAK_PX, (BREAKS_SHARE * width) / breaks);
  const pxPerMs = recordedMs === 0 ? 0 : (width - breaks * breakPx) / recordedMs;
  let x = 0;
  const placed = stretches.map(({ fromMs, toMs }): PlacedStretch => {
    const fromX = x;
    const toX = fromX + (toMs - fromMs) * pxPerMs;
    x = toX + breakPx;
    return { fromMs, toMs, fromX, toX };
  });
  return {
    stretches: placed,
    xOf(atMs) {
      for (const [index, stretch] of placed.entries()) {
        if (atMs > stretch.toMs) continue;
        if (atMs >= stretch.fromMs) return stretch.fromX + (atMs - stretch.fromMs) * pxPerMs;
        return index === 0 ? 0 : (placed[index - 1].toX + stretch.fromX) / 2;
      }
      return placed.length === 0 ? 0 : placed[placed.length - 1].toX;
    },
    msOf(wantedX) {
      let nearest = placed[0]?.fromMs ?? 0;
      let distance = Infinity;
      for (const { fromMs, toMs, fromX, toX } of placed) {
        const inside = Math.min(toX, Math.max(fromX, wantedX));
        if (Math.abs(inside - wantedX) < distance) {
          distance = Math.abs(inside - wantedX);
          nearest = pxPerMs === 0 ? fromMs : Math.min(toMs, fromMs + (inside - fromX) / pxPerMs);
        }
      }
      return nearest;
    },
  };
}
