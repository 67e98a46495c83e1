import type { FirmInput, YardWindow } from './firm-input.js';
import type { MixedIntegerProgram } from './mixed-integer-program.js';
import { VISIT_KINDS } from './plan-input.js';
import type { VisitKind } from './plan-input.js';
import { ProgramBuilder } from './program-builder.js';
import type { VesselOption } from './vessel-option.js';
import { MINOR_PER_PROGRAM_UNIT } from './vessel-program.js';
import type { WindowPrices, WindowRoom } from './vessel-program.js';

/** One limited room of the yard: hours, or berths of a kind, in a window. */
export interface RoomLimit {
  windowId: string;
  /** Null: rigger hours. */
  kind: VisitKind | null;
  limit: number;
}

/** One way to plan a vessel, as the master sees it: what it weighs, and what it takes of each limit. */
export interface MasterColumn {
  vessel: number;
  weightMinor: number;
  uses: readonly number[];
}

/** The program that picks a mix of columns; column c of the program is column c of the list. */
export interface FirmMaster {
  program: MixedIntegerProgram;
  /** Column of what goes beyond each limit. */
  beyond: number[];
  /** Row of each limit. */
  rows: number[];
}

/** Every limited room of a yard, in a fixed order. */
export function roomLimits(windows: readonly YardWindow[]): RoomLimit[] {
  return windows.flatMap(({ id, riggerHours, berths }) => [
    ...(riggerHours === undefined ? [] : [{ windowId: id, kind: null, limit: riggerHours }]),
    ...VISIT_KINDS.flatMap((kind) => {
      const limit = berths?.[kind];
      return limit === undefined ? [] : [{ windowId: id, kind, limit }];
    }),
  ]);
}

/** How much of a limited room an option takes. */
export function useOf(option: VesselOption, limit: RoomLimit): number {
  const use = option.uses.find(({ windowId }) => windowId === limit.windowId);
  if (use === undefined) return 0;
  return limit.kind === null ? use.hours : use.kind === limit.kind ? 1 : 0;
}

/** Price of a unit beyond a limit, minor units: so high that every other way is taken first. */
export function lastResortMinor(firm: FirmInput): number {
  const visitCosts = firm.vessels.flatMap(({ input }) =>
    Object.values(input.visitTerms).map(({ costMinor }) => costMinor),
  );
  return 100 * Math.max(1, ...visitCosts);
}

/** What an option weighs: its cost and its days late. */
export function weightMinor(option: VesselOption, firm: Pick<FirmInput, 'lateDayCostMinor'>): number {
  return option.costMinor + option.lateDays * firm.lateDayCostMinor;
}

/**
 * The master program over the columns found so far: one per vessel at least weight, no limit passed except at a price so
 * high that it is a last resort.
 *
 * @param whole false: its relaxation, whose row prices say what a berth and an hour are worth
 * @param beyondMinor price of one unit beyond a limit, minor units
 */
export function firmMaster(
  limits: readonly RoomLimit[],
  vesselCount: number,
  columns: readonly MasterColumn[],
  beyondMinor: number,
  whole: boolean,
): FirmMaster {
  const builder = new ProgramBuilder();
  const ofVessels: [number, number][][] = Array.from({ length: vesselCount }, () => []);
  const ofLimits: [number, number][][] = limits.map(() => []);
  for (const { vessel, weightMinor: weight, uses } of columns) {
    const cost = weight / MINOR_PER_PROGRAM_UNIT;
    const column = whole ? builder.addChoice(cost) : builder.addAmount(cost, 0, Infinity);
    ofVessels[vessel].push([column, 1]);
    uses.forEach((use, at) => {
      if (use !== 0) ofLimits[at].push([column, use]);
    });
  }
  const beyond = limits.map(() => builder.addAmount(beyondMinor / MINOR_PER_PROGRAM_UNIT, 0, Infinity));
  const rows = limits.map(({ limit }, at) =>
    builder.addRow(-Infinity, limit, [...ofLimits[at], [beyond[at], -1]]),
  );
  for (const entries of ofVessels) builder.addRow(1, 1, entries);
  return { program: builder.build(), beyond, rows };
}

/** Prices per limit, minor units a unit, as prices per window. */
export function pricesPerWindow(limits: readonly RoomLimit[], minorPerUnit: readonly number[]): WindowPrices {
  const perHourMinor = new Map<string, number>();
  const perBerthMinor = new Map<string, Partial<Record<VisitKind, number>>>();
  limits.forEach(({ windowId, kind }, at) => {
    if (kind === null) perHourMinor.set(windowId, minorPerUnit[at]);
    else perBerthMinor.set(windowId, { ...perBerthMinor.get(windowId), [kind]: minorPerUnit[at] });
  });
  return { perHourMinor, perBerthMinor };
}

/** Room left per limit, as room per window; never below nothing. */
export function roomPerWindow(limits: readonly RoomLimit[], left: readonly number[]): WindowRoom {
  const hours = new Map<string, number>();
  const berths = new Map<string, Partial<Record<VisitKind, number>>>();
  limits.forEach(({ windowId, kind }, at) => {
    const room = Math.max(0, left[at]);
    if (kind === null) hours.set(windowId, room);
    else berths.set(windowId, { ...berths.get(windowId), [kind]: room });
  });
  return { hours, berths };
}
