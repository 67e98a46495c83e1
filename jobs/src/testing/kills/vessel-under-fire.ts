import { createHash } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import type { Factories } from '@stayledger/backend/testing/factories';
import { newId } from '@stayledger/backend/persistence';
import { mappingTo } from '../log-journey.js';
import type { PlannedLog } from './log-plan.js';
import { PatientClient, type Reply } from './patient-client.js';
import { pause } from './service-process.js';

const TUS = { 'Tus-Resumable': '1.0.0' };
const SETTLE_WITHIN_MS = 240_000;

interface World {
  url: string;
  make: Factories;
  filesFolder: string;
}

/** A log on its way, and how much of it the service has said it holds. */
interface Sent {
  planned: PlannedLog;
  id: string;
  acknowledged: number;
}

/**
 * A vessel whose person sends all logs of the plan, posts what was counted and cancels what was planned so, and asks
 * again whenever the service was killed in between.
 */
export class VesselUnderFire {
  private readonly sent: Sent[] = [];
  /** What must not be, in words. */
  readonly violations: string[] = [];
  /** Counts that were given up after three kills and read again by the person. */
  readAgain = 0;

  private constructor(
    private readonly world: World,
    readonly client: PatientClient,
    readonly vesselId: string,
    private readonly positionId: string,
  ) {}

  static async create(world: World): Promise<VesselUnderFire> {
    const vessel = await world.make.vessel({ buildYear: 2015 });
    const rigger = await world.make.userOn(vessel, 'rigger', { firmId: vessel.firmId });
    const position = await world.make.position(vessel, { label: 'Cap shroud, port' });
    const client = new PatientClient(world.url);
    await client.signIn(rigger.email);
    const made = await client.ask({
      method: 'POST',
      path: `/api/positions/${position.id}/parts`,
      headers: { 'Idempotency-Key': newId() },
      json: {
        constructionId: 'strand-1x19-316',
        diameterMm: 8,
        breakingLoadKn: 40,
        breakingLoadFromCertificate: true,
        upperTerminal: 'swaged',
        lowerTerminal: 'swaged',
        threadSize: 'M12',
        pinDiameterMm: 12,
        fittedOn: '2025-04-01',
      },
    });
    if (made.status !== 201) throw new Error(`part: ${JSON.stringify(made)}`);
    return new VesselUnderFire(world, client, vessel.id, position.id);
  }

  get logIds(): string[] {
    return this.sent.map(({ id }) => id);
  }

  /** Sends, posts and cancels everything, one log after the other. */
  async live(plan: readonly PlannedLog[]): Promise<void> {
    for (const planned of plan) {
      const sent = await this.announce(planned);
      const bytesSent = await this.send(sent);
      if (!bytesSent) continue;
      await this.post(sent);
    }
  }

  /** While the service is down: is every byte it acknowledged on the disk? Returns how many it has acknowledged. */
  checkAcknowledgedBytes(): number {
    let total = 0;
    for (const { planned, id, acknowledged } of this.sent) {
      if (acknowledged === 0 || planned.cancelled) continue;
      total += acknowledged;
      const path = join(this.world.filesFolder, this.vesselId, id);
      const found = [path, `${path}.part`].find(existsSync);
      if (found === undefined) this.violations.push(`${planned.name}: the file is gone`);
      else if (
        sha256(readFileSync(found).subarray(0, acknowledged)) !==
        sha256(planned.bytes.subarray(0, acknowledged))
      )
        this.violations.push(`${planned.name}: not the ${acknowledged} bytes that were acknowledged`);
    }
    return total;
  }

  private async announce(planned: PlannedLog): Promise<Sent> {
    // One key for the wish, however often it has to be said.
    const key = newId();
    const reply = await this.client.ask({
      method: 'POST',
      path: `/api/vessels/${this.vesselId}/load-logs`,
      headers: { 'Idempotency-Key': key },
      json: {
        fileName: planned.name,
        sizeBytes: planned.bytes.length,
        mapping: mappingTo(this.positionId),
      },
    });
    if (reply.status !== 201) throw new Error(`announce: ${JSON.stringify(reply)}`);
    const sent = { planned, id: (reply.body as LoadLogDto).id, acknowledged: 0 };
    this.sent.push(sent);
    return sent;
  }

  /** As the browser's client does it: ask where to go on, send from there. False when it was cancelled. */
  private async send(sent: Sent): Promise<boolean> {
    const { planned, id } = sent;
    const { bytes } = planned;
    const metadata = `loadLogId ${Buffer.from(id).toString('base64')}`;
    const created = await this.client.ask({
      method: 'POST',
      path: '/api/uploads',
      headers: { ...TUS, 'Upload-Length': String(bytes.length), 'Upload-Metadata': metadata },
    });
    if (created.status !== 201) this.violations.push(`${planned.name}: begun with ${created.status}`);
    const piece = Math.ceil(bytes.length / planned.pieces);
    for (;;) {
      const offset = await this.offsetOf(sent);
      if (offset >= bytes.length) return true;
      if (planned.cancelled && offset > bytes.length / 2) {
        await this.cancel(sent);
        return false;
      }
      const reply = await this.client.askOnce({
        method: 'PATCH',
        path: `/api/uploads/${id}`,
        headers: {
          ...TUS,
          'Upload-Offset': String(offset),
          'Content-Type': 'application/offset+octet-stream',
        },
        bytes: bytes.subarray(offset, offset + piece),
      });
      if (reply === null) await pause(100);
      else if (reply.status === 204) sent.acknowledged = Number(reply.headers.get('upload-offset'));
      else if (reply.status !== 409 && reply.status < 500) {
        throw new Error(`${planned.name}: a piece was answered with ${JSON.stringify(reply)}`);
      }
    }
  }

  private async offsetOf(sent: Sent): Promise<number> {
    const reply = await this.client.ask({ method: 'HEAD', path: `/api/uploads/${sent.id}`, headers: TUS });
    const offset = Number(reply.headers.get('upload-offset') ?? NaN);
    if (!(offset >= sent.acknowledged)) {
      this.violations.push(
        `${sent.planned.name}: ${sent.acknowledged} bytes acknowledged, ${reply.status} with offset ${offset} later`,
      );
      throw new Error(`${sent.planned.name}: where to go on is not known`);
    }
    return offset;
  }

  private async cancel(sent: Sent): Promise<void> {
    for (;;) {
      const reply = await this.client.askOnce({
        method: 'DELETE',
        path: `/api/uploads/${sent.id}`,
        headers: TUS,
      });
      // A cancelled upload cancelled again is no upload any more.
      if (reply !== null && [204, 404, 409, 410].includes(reply.status)) return;
      await pause(100);
    }
  }

  private async post(sent: Sent): Promise<void> {
    const deadline = performance.now() + SETTLE_WITHIN_MS;
    for (;;) {
      const log = await this.logOf(sent.id);
      if (log.state === 'posted') return;
      let reply: Reply | null = null;
      if (log.state === 'counted') {
        reply = await this.client.askOnce({
          method: 'POST',
          path: `/api/load-logs/${sent.id}/post`,
          json: { version: log.version },
        });
      } else if (log.state === 'failed') {
        if (log.failure?.code !== 'interrupted') {
          throw new Error(`${sent.planned.name} failed: ${JSON.stringify(log.failure)}`);
        }
        this.readAgain += 1;
        await this.client.askOnce({
          method: 'POST',
          path: `/api/load-logs/${sent.id}/recount`,
          json: { version: log.version, mapping: log.mapping },
        });
      }
      if (reply?.status === 200) return;
      if (performance.now() > deadline) {
        throw new Error(`${sent.planned.name} stays ${log.state}: ${JSON.stringify(log.job)}`);
      }
      await pause(log.state === 'counted' ? 50 : 400);
    }
  }

  private async logOf(id: string): Promise<LoadLogDto> {
    const reply = await this.client.ask({ method: 'GET', path: `/api/load-logs/${id}` });
    if (reply.status !== 200) throw new Error(`log: ${JSON.stringify(reply)}`);
    return reply.body as LoadLogDto;
  }
}

function sha256(bytes: Buffer): string {
  return createHash('sha256').update(bytes).digest('hex');
}
