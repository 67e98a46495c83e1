import { mkdtempSync, openSync, readSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Factories } from '@stayledger/backend/testing/factories';
import type { LoadLogDto, LogMapping } from '@stayledger/shared/contracts/load-logs';
import { Pool } from 'pg';
import { OwnCluster } from '../src/testing/kills/own-cluster.js';
import { PatientClient } from '../src/testing/kills/patient-client.js';
import { anyFreePort, pause, ServiceProcess } from '../src/testing/kills/service-process.js';
import type { BenchRow } from './bench-row.js';
import { LOAD_COLUMNS, makeLogFile } from './make-log-file.js';
import { median } from './measure.js';

const ROWS = 5_000_000;
const ROUNDS = 5;
/** Requests of the idle side of a round; a count takes as long as it takes. */
const REQUESTS = 200;
const BETWEEN_REQUESTS_MS = 10;
const PIECE_BYTES = 16 * 1024 ** 2;
const TUS = { 'Tus-Resumable': '1.0.0' };

/** The built service in one process: what people notice of it while it counts a long log. */
export const apiRow: BenchRow = {
  values: [
    {
      name: 'apiP95Ratio',
      what: 'p95 of API replies while 5,000,000 rows are counted, over idle',
      better: 'lower',
      reach: 1.5,
      ambition: 1.2,
    },
    {
      name: 'loopDelayP99Ms',
      what: 'p99 of the delay of the event loop meanwhile',
      better: 'lower',
      reach: 50,
      ambition: 20,
    },
  ],
  async run() {
    const file = makeLogFile(ROWS);
    const cluster = await OwnCluster.start();
    const database = await makeDatabase(cluster.adminUrl);
    const dataFolder = mkdtempSync(join(tmpdir(), 'stayledger-bench-api-'));
    const port = await anyFreePort();
    const service = ServiceProcess.start(
      'all-in-one',
      {
        DATABASE_APP_URL: database.appUrl,
        STAYLEDGER_DATA: dataFolder,
        SESSION_SECRET: 'a session secret for the bench alone',
        PORT: String(port),
        // Requests come from many addresses, or the limit per address would be measured.
        TRUST_PROXY: '1',
      },
      { execArgv: ['--require', join(__dirname, 'loop-probe.cjs')], ipc: true },
    );
    try {
      await service.untilReady();
      const make = new Factories(database.admin, { now: () => new Date() });
      return await measure(`http://127.0.0.1:${port}`, make, service, file);
    } finally {
      await service.stop();
      await database.admin.end();
      await cluster.end();
      rmSync(dataFolder, { recursive: true, force: true });
    }
  },
};

async function measure(
  url: string,
  make: Factories,
  service: ServiceProcess,
  file: string,
): Promise<Record<string, number>> {
  const vessel = await make.vessel({ buildYear: 2015 });
  const rigger = await make.userOn(vessel, 'rigger', { firmId: vessel.firmId });
  const client = new PatientClient(url);
  await client.signIn(rigger.email);
  const positions: string[] = [];
  for (const column of LOAD_COLUMNS) {
    const { id } = await make.position(vessel, { label: column });
    positions.push(id);
    await expectStatus(201, client, 'POST', `/api/positions/${id}/parts`, {
      constructionId: 'strand-1x19-316',
      diameterMm: 10,
      breakingLoadKn: 71,
      breakingLoadFromCertificate: true,
      upperTerminal: 'swaged',
      lowerTerminal: 'swaged',
      fittedOn: '2025-04-01',
    });
  }
  const mapping: LogMapping = {
    delimiter: ',',
    decimalComma: false,
    time: { column: 'time', format: 'iso', naiveOffsetMinutes: 0 },
    channels: LOAD_COLUMNS.map((column, i) => ({ column, unit: 'kN', positionId: positions[i] })),
  };
  const log = (await expectStatus(201, client, 'POST', `/api/vessels/${vessel.id}/load-logs`, {
    fileName: 'season.csv',
    sizeBytes: statSync(file).size,
    mapping,
  })) as LoadLogDto;
  await upload(client, log.id, file);
  const paths = [
    '/api/vessels',
    `/api/vessels/${vessel.id}/rig`,
    `/api/vessels/${vessel.id}/load-logs`,
    `/api/load-logs/${log.id}`,
  ];
  // The first count warms the threads' code up.
  const first = await settled(client, log.id);
  const ratios: number[] = [];
  const delays: number[] = [];
  for (let round = 0; round < ROUNDS; round++) {
    await ask(client, paths, (asked) => asked < 20);
    const idle = await ask(client, paths, (asked) => asked < REQUESTS);
    const before = await settled(client, log.id);
    await expectStatus(200, client, 'POST', `/api/load-logs/${log.id}/recount`, {
      version: before.version,
      mapping,
    });
    await service.send({});
    let counting = true;
    const counted = settled(client, log.id).finally(() => {
      counting = false;
    });
    const busy = await ask(client, paths, () => counting);
    const { p99Ms } = (await service.send({})) as { p99Ms: number };
    expectSameCount(first, await counted);
    ratios.push(p95(busy) / p95(idle));
    delays.push(p99Ms);
  }
  if (client.oddReplies.length > 0) throw new Error(client.oddReplies.join('\n'));
  return { apiP95Ratio: median(ratios), loopDelayP99Ms: median(delays) };
}

/** A database made by the built commands, as a first start makes it. */
async function makeDatabase(adminUrl: string): Promise<{ appUrl: string; admin: Pool }> {
  const urlOf = (user: string, database: string): string => {
    const url = new URL(adminUrl);
    if (user !== '') url.username = user;
    url.pathname = `/${database}`;
    return url.href;
  };
  const password = decodeURIComponent(new URL(adminUrl).password);
  const first = new Pool({ connectionString: adminUrl, max: 1 });
  await first.query(`create role stayledger_app login password '${password}'`);
  await first.query(`create role bench_owner login password '${password}'`);
  await first.query('create database bench owner bench_owner');
  await first.end();
  for (const [name, args] of [
    ['migrate', []],
    ['seed', ['--reference']],
  ] as const) {
    const env = { DATABASE_OWNER_URL: urlOf('bench_owner', 'bench') };
    const command = ServiceProcess.start(name, env, { args: [...args] });
    const { code } = await command.ended;
    if (code !== 0) throw new Error(command.lastWords);
  }
  const admin = new Pool({ connectionString: urlOf('', 'bench'), max: 2 });
  admin.on('error', () => undefined);
  return { appUrl: urlOf('stayledger_app', 'bench'), admin };
}

/** Sends the file as the browser's client does. */
async function upload(client: PatientClient, id: string, path: string): Promise<void> {
  const { size } = statSync(path);
  const metadata = `loadLogId ${Buffer.from(id).toString('base64')}`;
  await client.ask({
    method: 'POST',
    path: '/api/uploads',
    headers: { ...TUS, 'Upload-Length': String(size), 'Upload-Metadata': metadata },
  });
  const file = openSync(path, 'r');
  const piece = Buffer.alloc(PIECE_BYTES);
  for (let offset = 0; offset < size;) {
    const length = readSync(file, piece, 0, piece.length, offset);
    const reply = await client.ask({
      method: 'PATCH',
      path: `/api/uploads/${id}`,
      headers: {
        ...TUS,
        'Upload-Offset': String(offset),
        'Content-Type': 'application/offset+octet-stream',
      },
      bytes: piece.subarray(0, length),
    });
    if (reply.status !== 204) throw new Error(`a piece was answered with ${JSON.stringify(reply)}`);
    offset += length;
  }
}

/** Milliseconds of each reply, one after the other. */
async function ask(
  client: PatientClient,
  paths: readonly string[],
  goOn: (asked: number) => boolean,
): Promise<number[]> {
  const times: number[] = [];
  while (goOn(times.length)) {
    const n = times.length;
    const from = performance.now();
    const reply = await client.ask({
      method: 'GET',
      path: paths[n % paths.length],
      headers: { 'X-Forwarded-For': `10.0.${n % 200}.1` },
    });
    times.push(performance.now() - from);
    if (reply.status !== 200) throw new Error(`${paths[n % paths.length]}: ${reply.status}`);
    await pause(BETWEEN_REQUESTS_MS);
  }
  return times;
}

async function settled(client: PatientClient, id: string): Promise<LoadLogDto> {
  for (let tries = 0; ; tries += 1) {
    const reply = await client.ask({
      method: 'GET',
      path: `/api/load-logs/${id}`,
      headers: { 'X-Forwarded-For': `10.1.${tries % 200}.1` },
    });
    const log = reply.body as LoadLogDto;
    if (log.state === 'counted') return log;
    if (log.state === 'failed') throw new Error(JSON.stringify(log.failure));
    await pause(250);
  }
}

/** A count that was only quick would be worth nothing: all rows, and the same findings each time. */
function expectSameCount(first: LoadLogDto, log: LoadLogDto): void {
  const said = ({ rows, fromAt, toAt, loggedHours, findings }: LoadLogDto) =>
    JSON.stringify({ rows, fromAt, toAt, loggedHours, findings });
  if (log.rows !== ROWS || said(log) !== said(first)) {
    throw new Error(`counted ${said(log)}, at first ${said(first)}`);
  }
}

async function expectStatus(
  status: number,
  client: PatientClient,
  method: string,
  path: string,
  json: unknown,
): Promise<unknown> {
  const reply = await client.ask({ method, path, json });
  if (reply.status !== status) throw new Error(`${path}: ${JSON.stringify(reply)}`);
  return reply.body;
}

function p95(times: readonly number[]): number {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.floor(0.95 * (sorted.length - 1))];
}
