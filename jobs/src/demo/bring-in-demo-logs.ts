import { setTimeout as pause } from 'node:timers/promises';
import type { Logger } from '@nestjs/common';
import { DEMO_VESSELS, type DemoVessel } from '@stayledger/backend/database/seed/demo-scenario';
import type { LoadLogDto, LogMapping } from '@stayledger/shared/contracts/load-logs';
import type { Side } from '@stayledger/shared/rig/positions';
import { cutterLogs, type DemoLog, sloopLogs } from './demo-logs.js';

const LOOK_EVERY_MS = 500;

/** The steps of an upload, done from within the process; the API's own services stand behind it. */
export interface DemoIntake {
  list(userId: string, vesselId: string): Promise<LoadLogDto[]>;
  receive(log: {
    vesselId: string;
    userId: string;
    fileName: string;
    mapping: LogMapping;
    bytes: Buffer;
  }): Promise<LoadLogDto>;
  get(userId: string, loadLogId: string): Promise<LoadLogDto>;
  post(userId: string, log: Pick<LoadLogDto, 'id' | 'version'>): Promise<LoadLogDto>;
}

export interface DemoDeps {
  intake: DemoIntake;
  /** The person in whose name the logs come in. */
  userId: string;
  /** Day of the first start: every date of the demo is counted from it. */
  firstDayOn: string;
  logger: Pick<Logger, 'log'>;
  signal: AbortSignal;
}

/**
 * Uploads the demo's logs, has them counted, and posts the one that is posted in the demo's story. A log that is there
 * already is left as it is, so a start that was interrupted is gone on with at the next one.
 */
export async function bringInDemoLogs(deps: DemoDeps): Promise<void> {
  const [cutter, sloop] = [vesselWith('cutter'), vesselWith('fractional-sloop')];
  for (const [vessel, logs] of [
    [cutter, cutterLogs(deps.firstDayOn)],
    [sloop, sloopLogs(deps.firstDayOn)],
  ] as const) {
    const known = await deps.intake.list(deps.userId, vessel.id);
    for (const log of logs) await bringIn(deps, vessel, log, known);
  }
}

async function bringIn(
  deps: DemoDeps,
  vessel: DemoVessel,
  demoLog: DemoLog,
  known: readonly LoadLogDto[],
): Promise<void> {
  const { intake, userId, signal } = deps;
  const there = known.find(({ fileName, state }) => fileName === demoLog.fileName && state !== 'receiving');
  const received =
    there ??
    (await intake.receive({
      vesselId: vessel.id,
      userId,
      fileName: demoLog.fileName,
      mapping: demoLog.mapping((kind, side) => positionIdOn(vessel, kind, side)),
      bytes: demoLog.bytes(),
    }));
  if (!there) deps.logger.log(`demo: ${demoLog.fileName} came in`);
  if (demoLog.then !== 'post') return;
  let log = received;
  while (log.state === 'received' || log.state === 'counting') {
    await pause(LOOK_EVERY_MS, undefined, { signal });
    log = await intake.get(userId, log.id);
  }
  if (log.state !== 'counted') return;
  await intake.post(userId, log);
  deps.logger.log(`demo: ${demoLog.fileName} is posted`);
}

function vesselWith(rigType: DemoVessel['rigType']): DemoVessel {
  const found = DEMO_VESSELS.find((vessel) => vessel.rigType === rigType);
  if (!found) throw new Error(`the demo has no ${rigType}`);
  return found;
}

function positionIdOn(vessel: DemoVessel, kind: string, side: Side): string {
  const found = vessel.positions.find(
    (position) => position.kind === kind && position.side === side && position.mast === 'main',
  );
  if (!found) throw new Error(`${vessel.name} has no ${kind} on the ${side} side`);
  return found.id;
}
