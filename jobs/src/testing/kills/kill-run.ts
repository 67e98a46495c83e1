import { readdirSync } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Clock } from '@stayledger/backend/persistence';
import { Factories } from '@stayledger/backend/testing/factories';
import { createTestDatabase, type TestDatabase } from '@stayledger/backend/testing/test-database';
import { SeededRandom } from '../../demo/seeded-random.js';
import { accountsOf, whatWasDoneTwice } from './accounts.js';
import { planLogs } from './log-plan.js';
import { OwnCluster } from './own-cluster.js';
import { anyFreePort, pause } from './service-process.js';
import type { Topology } from './topology.js';
import { VesselUnderFire } from './vessel-under-fire.js';

const VESSELS_AT_ONCE = 3;
/** Kills fall within this time after the service is ready: an upload, a count and a posting take about as long. */
const CALM_MS = 1800;
/** One kill in so many falls while the service is still starting. */
const KILLS_AT_BOOT = 6;

export interface KillFigures {
  kills: Record<string, number>;
  vessels: number;
  logsPosted: number;
  uploadsCancelled: number;
  countsReadAgain: number;
  startsThatBrokeOff: number;
  requestsUnanswered: number;
  acknowledgedMiBChecked: number;
  seconds: number;
}

/**
 * People at work on a service that is killed again and again at random moments of its life. In the end all of them have
 * finished, and what they left is compared with a vessel that did the same in peace.
 */
export class KillRun {
  private readonly vessels: VesselUnderFire[] = [];
  private readonly plan = planLogs();
  private checkedBytes = 0;

  private constructor(
    private readonly cluster: OwnCluster,
    private readonly database: TestDatabase,
    private readonly dataFolder: string,
    private readonly topology: Topology,
    private readonly make: Factories,
    private readonly url: string,
    private readonly random: SeededRandom,
  ) {}

  static async prepare(
    seed: string,
    makeTopology: (world: { env: Record<string, string>; database: TestDatabase }) => Promise<Topology>,
  ): Promise<KillRun> {
    const cluster = await OwnCluster.start();
    const database = await createTestDatabase();
    const dataFolder = await mkdtemp(join(tmpdir(), 'stayledger-kills-'));
    const port = await anyFreePort();
    const env = {
      DATABASE_APP_URL: database.appUrl,
      STAYLEDGER_DATA: dataFolder,
      SESSION_SECRET: 'a session secret for tests of kills alone',
      PORT: String(port),
      COUNTING_THREADS: '1',
      LOG_LEVEL: 'info',
    };
    const topology = await makeTopology({ env, database });
    return new KillRun(
      cluster,
      database,
      dataFolder,
      topology,
      new Factories(database.admin, new Clock()),
      `http://127.0.0.1:${port}`,
      new SeededRandom(seed),
    );
  }

  /** Kills so many times, then lets everybody finish in peace. */
  async run(kills: number): Promise<KillFigures> {
    const from = performance.now();
    await this.topology.start();
    const peaceful = await this.launch();
    await peaceful.live(this.plan);

    let killing = true;
    const people = Array.from({ length: VESSELS_AT_ONCE }, async () => {
      do {
        const vessel = await this.launch();
        await vessel.live(this.plan);
      } while (killing);
    });
    // A person who cannot go on is told of at the end; the others go on.
    const ends = Promise.allSettled(people);
    const count: Record<string, number> = {};
    for (let i = 0; i < kills; i++) {
      const atBoot = i % KILLS_AT_BOOT === KILLS_AT_BOOT - 1;
      if (!atBoot) await this.topology.untilReady();
      await pause(this.random.between(0, CALM_MS));
      const killed = await this.topology.killSomething(this.random, () => this.checkBytes());
      count[killed] = (count[killed] ?? 0) + 1;
    }
    killing = false;
    await this.topology.untilReady();
    const broken = (await ends).flatMap((end) => (end.status === 'rejected' ? [String(end.reason)] : []));
    this.checkBytes();
    await this.expectOrder(peaceful, broken);
    const stopped = await this.topology.stop();
    if (stopped.length > 0) throw new Error(stopped.join('\n'));
    const posted = this.plan.filter(({ cancelled }) => !cancelled).length * this.vessels.length;
    return {
      kills: count,
      vessels: this.vessels.length,
      logsPosted: posted,
      uploadsCancelled: this.vessels.length * this.plan.length - posted,
      countsReadAgain: sum(this.vessels.map(({ readAgain }) => readAgain)),
      startsThatBrokeOff: this.topology.startsAgain(),
      requestsUnanswered: sum(this.vessels.map(({ client }) => client.unanswered)),
      acknowledgedMiBChecked: Math.round(this.checkedBytes / 1024 ** 2),
      seconds: Math.round((performance.now() - from) / 1000),
    };
  }

  async end(): Promise<void> {
    await this.topology.end();
    await this.database.drop();
    await this.cluster.end();
    await rm(this.dataFolder, { recursive: true, force: true });
  }

  private get filesFolder(): string {
    return join(this.dataFolder, 'files');
  }

  private async launch(): Promise<VesselUnderFire> {
    const { url, make, filesFolder } = this;
    for (let tries = 1; ; tries += 1) {
      try {
        const vessel = await VesselUnderFire.create({ url, make, filesFolder });
        this.vessels.push(vessel);
        return vessel;
      } catch (error) {
        // Its rows are written past the service, on a database that is just recovering from a kill.
        if (tries === 20) throw error;
        await pause(500);
      }
    }
  }

  private checkBytes(): void {
    for (const vessel of this.vessels) this.checkedBytes += vessel.checkAcknowledgedBytes();
  }

  /** Throws with all that is not in order. */
  private async expectOrder(peaceful: VesselUnderFire, broken: string[]): Promise<void> {
    // A count that was killed at each of its tries is given up, which the person reads and mends.
    const errors = this.topology.errors().filter((line) => !line.includes('given up: job'));
    const wrong = [...broken, ...errors];
    for (const vessel of this.vessels) wrong.push(...vessel.violations, ...vessel.client.oddReplies);
    const { admin } = this.database;
    wrong.push(...(await whatWasDoneTwice(admin, this.plan)));
    const expected = await accountsOf(admin, peaceful.vesselId);
    for (const vessel of this.vessels) {
      const found = await accountsOf(admin, vessel.vesselId);
      for (const [name, damage] of Object.entries(expected)) {
        // Additions in another order may differ in the last digits of a double.
        if (!(Math.abs(found[name] - damage) <= 1e-9 * Math.abs(damage))) {
          wrong.push(`vessel ${vessel.vesselId}: ${name} is ${found[name]}, in peace it is ${damage}`);
        }
      }
      const files = readdirSync(join(this.filesFolder, vessel.vesselId)).sort();
      const kept = vessel.logIds.filter((_, i) => !this.plan[i].cancelled).sort();
      if (files.join() !== kept.join()) {
        wrong.push(`vessel ${vessel.vesselId}: files ${files.join(', ')}, expected ${kept.join(', ')}`);
      }
    }
    if (wrong.length > 0) throw new Error(`not in order:\n${[...new Set(wrong)].slice(0, 40).join('\n')}`);
  }
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
