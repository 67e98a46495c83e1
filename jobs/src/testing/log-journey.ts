import { gzipSync } from 'node:zlib';
import { MikroORM } from '@mikro-orm/postgresql';
import { ormOptions } from '@stayledger/backend/database/mikro-orm.config';
import { seedReferenceData } from '@stayledger/backend/database/seed/reference-data';
import { TestApp, type Agent } from '@stayledger/backend/testing/test-app';
import type { TestUser, TestVessel } from '@stayledger/backend/testing/factories';
import type { LoadLogDto, LogMapping } from '@stayledger/shared/contracts/load-logs';
import type { FittedPartDto } from '@stayledger/shared/contracts/parts';
import { JobsModule } from '../jobs.module.js';

const SETTLED = ['counted', 'posted', 'set-aside', 'failed'];
const SETTLE_WITHIN_MS = 20_000;

/** The API and the worker in one process, with the reference data, on a database of their own. */
export async function createTestService(env: Record<string, string> = {}): Promise<TestApp> {
  const app = await TestApp.create({ imports: [JobsModule], env: { COUNTING_THREADS: '1', ...env } });
  const orm = await MikroORM.init(ormOptions(app.database.ownerUrl));
  try {
    await seedReferenceData(orm.em.fork(), app.clock.now());
  } finally {
    await orm.close(true);
  }
  return app;
}

/** A vessel with one stay of strand, its rigger signed in. */
export interface LoggedVessel {
  vessel: TestVessel;
  rigger: TestUser;
  agent: Agent;
  position: { id: string; label: string };
  part: FittedPartDto;
}

export async function createLoggedVessel(
  app: TestApp,
  part: Record<string, unknown> = {},
): Promise<LoggedVessel> {
  const vessel = await app.make.vessel({ buildYear: 2015 });
  const rigger = await app.make.userOn(vessel, 'rigger', { firmId: vessel.firmId });
  const agent = await app.signIn(rigger);
  const position = await app.make.position(vessel);
  const reply = await agent
    .post(`/api/positions/${position.id}/parts`)
    .send({
      constructionId: 'strand-1x19-316',
      diameterMm: 8,
      breakingLoadKn: 40,
      breakingLoadFromCertificate: true,
      upperTerminal: 'swaged',
      lowerTerminal: 'swaged',
      threadSize: 'M12',
      pinDiameterMm: 12,
      fittedOn: '2025-04-01',
      ...part,
    })
    .expect(201);
  return { vessel, rigger, agent, position, part: reply.body as FittedPartDto };
}

/** `hours` of a stay swinging between two loads, one row each `stepS` seconds. */
export function swingingCsv(options: {
  start: string;
  hours: number;
  lowKn: number;
  highKn: number;
  stepS?: number;
  column?: string;
}): string {
  const { start, hours, lowKn, highKn, stepS = 60, column = 'cap_port_kN' } = options;
  const from = Date.parse(start);
  const rows = Math.floor((hours * 3600) / stepS) + 1;
  const lines = [`time,${column}`];
  for (let i = 0; i < rows; i++) {
    lines.push(`${new Date(from + i * stepS * 1000).toISOString()},${i % 2 === 0 ? lowKn : highKn}`);
  }
  return `${lines.join('\n')}\n`;
}

export function mappingTo(positionId: string, override: Partial<LogMapping> = {}): LogMapping {
  return {
    delimiter: ',',
    decimalComma: false,
    time: { column: 'time', format: 'iso', naiveOffsetMinutes: 0 },
    channels: [{ column: 'cap_port_kN', unit: 'kN', positionId }],
    ...override,
  };
}

export async function announceLog(
  { agent, vessel, position }: Pick<LoggedVessel, 'agent' | 'vessel' | 'position'>,
  sizeBytes: number,
  override: { fileName?: string; mapping?: LogMapping } = {},
): Promise<LoadLogDto> {
  const { fileName = 'week.csv', mapping = mappingTo(position.id) } = override;
  const reply = await agent
    .post(`/api/vessels/${vessel.id}/load-logs`)
    .send({ fileName, sizeBytes, mapping })
    .expect(201);
  return reply.body as LoadLogDto;
}

/** Sends the bytes of an announced log over tus, in pieces. */
export async function sendBytes(agent: Agent, log: LoadLogDto, bytes: Buffer, pieces = 1): Promise<void> {
  const metadata = `loadLogId ${Buffer.from(log.id).toString('base64')}`;
  await agent
    .post('/api/uploads')
    .set({ 'Tus-Resumable': '1.0.0', 'Upload-Length': String(bytes.length), 'Upload-Metadata': metadata })
    .expect(201);
  const size = Math.ceil(bytes.length / pieces);
  for (let from = 0; from < bytes.length; from += size) {
    await sendPiece(agent, log.id, from, bytes.subarray(from, from + size)).expect(204);
  }
}

export function sendPiece(agent: Agent, loadLogId: string, offset: number, piece: Buffer) {
  return agent
    .patch(`/api/uploads/${loadLogId}`)
    .set({
      'Tus-Resumable': '1.0.0',
      'Upload-Offset': String(offset),
      'Content-Type': 'application/offset+octet-stream',
    })
    .send(piece);
}

export async function uploadLog(
  logged: LoggedVessel,
  contents: string | Buffer,
  override: { fileName?: string; mapping?: LogMapping; gzip?: boolean } = {},
): Promise<LoadLogDto> {
  const plain = Buffer.from(contents);
  const bytes = override.gzip ? gzipSync(plain) : plain;
  const log = await announceLog(logged, bytes.length, override);
  await sendBytes(logged.agent, log, bytes);
  return settled(logged.agent, log.id);
}

/** Polls a log until nothing more happens to it by itself. */
export async function settled(agent: Agent, loadLogId: string): Promise<LoadLogDto> {
  const deadline = performance.now() + SETTLE_WITHIN_MS;
  for (;;) {
    const { body } = await agent.get(`/api/load-logs/${loadLogId}`).expect(200);
    const log = body as LoadLogDto;
    if (SETTLED.includes(log.state)) return log;
    if (performance.now() > deadline) {
      throw new Error(`still ${log.state} after ${SETTLE_WITHIN_MS} ms: ${JSON.stringify(log.job)}`);
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
