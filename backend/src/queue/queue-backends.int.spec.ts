import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Bull, { type Job, type Queue, type QueueOptions } from 'bull';
import { startRedisServer, type TestRedisServer } from '../testing/redis-server.js';
import { QueueClients } from './queue-clients.js';

/**
 * The same cases on both places a queue can live: inside the process and on a Redis server. What passes on one and
 * not on the other is a gap of the embedded one.
 */

jest.setTimeout(60_000);

/** Waits for something to become true; says what was awaited when it never does. */
async function until(what: string, holds: () => boolean | Promise<boolean>, limitMs = 15_000): Promise<void> {
  const end = performance.now() + limitMs;
  while (!(await holds())) {
    if (performance.now() > end) throw new Error(`Waited ${limitMs} ms in vain: ${what}`);
    await pause(15);
  }
}

function pause(ms: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, ms));
}

/** A promise and the function that settles it: a processor that runs until the test lets it go. */
function latch(): { opened: Promise<void>; open: () => void } {
  let open = () => {};
  const opened = new Promise<void>((resolve) => {
    open = resolve;
  });
  return { opened, open };
}

describe.each(['embedded', 'redis'] as const)('Bull on the %s back end', (backEnd) => {
  let server: TestRedisServer | undefined;
  let clients: QueueClients;
  let queues: Queue[] = [];
  let letGo: (() => void)[] = [];
  let name = '';
  let caseNumber = 0;
  const folder = mkdtempSync(join(tmpdir(), 'stayledger-queue-'));

  beforeAll(async () => {
    if (backEnd === 'redis') server = await startRedisServer();
    clients = new QueueClients(server?.url);
  });

  beforeEach(() => {
    caseNumber += 1;
    name = `case-${caseNumber}`;
  });

  afterEach(async () => {
    for (const open of letGo) open();
    letGo = [];
    await Promise.all(queues.map((queue) => queue.close(true)));
    queues = [];
    clients.disconnect();
  });

  afterAll(async () => {
    await server?.stop();
    rmSync(folder, { recursive: true, force: true });
  });

  function openQueue(options: QueueOptions = {}): Queue {
    const queue = new Bull(name, {
      ...options,
      createClient: (type, redisOptions) => clients.create(type, redisOptions).setMaxListeners(0),
    });
    // Waiting for many jobs at once means many listeners, which Node would report as a leak.
    queue.setMaxListeners(0);
    queues.push(queue);
    return queue;
  }

  /** A processor that never ends by itself; the test's end releases it. */
  function hang(started: string[], label: string) {
    const { opened, open } = latch();
    letGo.push(open);
    return async () => {
      started.push(label);
      await opened;
    };
  }

  function processorFile(file: string, source: string): string {
    const path = join(folder, file);
    // A child that lost its parent must not work on alone.
    writeFileSync(path, `process.on('disconnect', () => process.exit(0));\n${source}`);
    return path;
  }

  it('runs 200 jobs with progress and reports them here and to others', async () => {
    const worker = openQueue();
    const observer = openQueue();
    const local = { progress: 0, completed: new Set<string>() };
    const global = { progress: 0, completed: new Set<string>() };
    worker.on('progress', () => (local.progress += 1));
    worker.on('completed', (job: Job) => local.completed.add(String(job.id)));
    observer.on('global:progress', () => (global.progress += 1));
    observer.on('global:completed', (jobId: unknown) => global.completed.add(String(jobId)));
    await observer.isReady();
    await pause(200);
    void worker.process(4, async (job: Job<{ n: number }>) => {
      await job.progress(50);
      await job.progress(100);
      return job.data.n * 2;
    });
    const jobs = await Promise.all(Array.from({ length: 200 }, (_, n) => worker.add({ n })));
    const ids = new Set(jobs.map((job) => String(job.id)));
    expect(ids.size).toBe(200);
    await until(
      '200 completions seen by both',
      () => local.completed.size === 200 && global.completed.size === 200,
      40_000,
    );
    expect(local.completed).toEqual(ids);
    expect(global.completed).toEqual(ids);
    await until('400 progress events', () => local.progress === 400 && global.progress === 400);
    expect((await worker.getJob(jobs[7].id))?.returnvalue).toBe(14);
    expect(await worker.getJobCounts()).toMatchObject({ completed: 200, waiting: 0, active: 0, failed: 0 });
  });

  it('adds many jobs in one go, in order', async () => {
    const queue = openQueue();
    const jobs = await queue.addBulk([1, 2, 3].map((n) => ({ name: 'bulk', data: { n } })));
    expect(jobs.map((job) => job.data.n)).toEqual([1, 2, 3]);
    expect(await queue.count()).toBe(3);
    const seen: number[] = [];
    void queue.process('bulk', async (job) => void seen.push(job.data.n));
    await until('three runs', () => seen.length === 3);
    expect(seen).toEqual([1, 2, 3]);
  });

  it('tells a waiting caller the result, unchanged', async () => {
    const queue = openQueue();
    void queue.process(async (job) => job.data.value);
    const values = [
      'Wantstag µ ≤ 3 🪢 "\\\n',
      'a\u0000b',
      [],
      {},
      [1, [2, []]],
      2 ** 53 - 1,
      -0.1,
      true,
      null,
    ];
    for (const value of values) {
      const job = await queue.add({ value });
      expect(await job.finished()).toEqual(value);
      expect((await queue.getJob(job.id))?.data).toEqual({ value });
    }
  });

  it('keeps a delayed job back until its time', async () => {
    const queue = openQueue();
    const added = performance.now();
    let startedAfterMs = 0;
    void queue.process(async () => {
      startedAfterMs = performance.now() - added;
    });
    const job = await queue.add({}, { delay: 500 });
    expect(await job.getState()).toBe('delayed');
    await job.finished();
    // Timers may fire a millisecond early.
    expect(startedAfterMs).toBeGreaterThanOrEqual(495);
  });

  it('tries again with growing pauses until it succeeds', async () => {
    const queue = openQueue();
    const startsMs: number[] = [];
    void queue.process(async () => {
      startsMs.push(performance.now());
      if (startsMs.length < 4) throw new Error(`attempt ${startsMs.length}`);
      return 'at last';
    });
    const job = await queue.add({}, { attempts: 4, backoff: { type: 'exponential', delay: 100 } });
    expect(await job.finished()).toBe('at last');
    expect(startsMs).toHaveLength(4);
    // Bull waits (2^n - 1) times the given pause after attempt n: 100, 300, 700 ms.
    const pausesMs = startsMs.slice(1).map((start, index) => start - startsMs[index]);
    [100, 300, 700].forEach((leastMs, index) => expect(pausesMs[index]).toBeGreaterThanOrEqual(leastMs - 10));
  });

  it('fails a job for good after its last attempt, with the reason', async () => {
    const queue = openQueue();
    const failures: number[] = [];
    queue.on('failed', (job: Job) => failures.push(job.attemptsMade));
    void queue.process(async () => {
      throw new Error('the file is empty');
    });
    const job = await queue.add({}, { attempts: 2 });
    await expect(job.finished()).rejects.toThrow('the file is empty');
    const stored = await queue.getJob(job.id);
    expect(stored).toMatchObject({ failedReason: 'the file is empty', attemptsMade: 2 });
    expect(stored?.stacktrace).toHaveLength(2);
    expect(await job.getState()).toBe('failed');
    expect(failures).toEqual([1, 2]);
  });

  it('repeats a job at an interval until told to stop', async () => {
    const queue = openQueue();
    let runs = 0;
    void queue.process('tick', async () => void (runs += 1));
    await queue.add('tick', {}, { repeat: { every: 200 } });
    expect(await queue.getRepeatableJobs()).toMatchObject([{ name: 'tick', every: 200 }]);
    await until('three ticks', () => runs >= 3);
    await queue.removeRepeatable('tick', { every: 200 });
    expect(await queue.getRepeatableJobs()).toEqual([]);
    await pause(300);
    const runsAtStop = runs;
    await pause(600);
    expect(runs).toBe(runsAtStop);
  });

  it('repeats a job by the calendar', async () => {
    const queue = openQueue();
    const dueMs: number[] = [];
    void queue.process('bell', async (job) => void dueMs.push(job.timestamp + job.opts.delay!));
    await queue.add('bell', {}, { repeat: { cron: '* * * * * *' } });
    await until('two bells', () => dueMs.length >= 2);
    expect(dueMs[1] - dueMs[0]).toBe(1000);
    expect(dueMs[0] % 1000).toBe(0);
  });

  it('takes a second job with the same id for the first', async () => {
    const queue = openQueue();
    let runs = 0;
    await queue.add({ n: 1 }, { jobId: 'log-1' });
    await queue.add({ n: 2 }, { jobId: 'log-1' });
    expect(await queue.count()).toBe(1);
    void queue.process(async () => void (runs += 1));
    await until('the run', () => runs === 1);
    await pause(100);
    expect(runs).toBe(1);
    expect((await queue.getJob('log-1'))?.data).toEqual({ n: 1 });
  });

  it('runs the most pressing first, and equals in the order of arrival', async () => {
    const queue = openQueue();
    for (const [label, priority] of [
      ['c1', 3],
      ['a1', 1],
      ['b1', 2],
      ['a2', 1],
      ['c2', 3],
    ] as const) {
      await queue.add({ label }, { priority });
    }
    const order: string[] = [];
    void queue.process(async (job) => void order.push(job.data.label));
    await until('five runs', () => order.length === 5);
    expect(order).toEqual(['a1', 'a2', 'b1', 'c1', 'c2']);
  });

  it('keeps to the limit of jobs in a span of time', async () => {
    const queue = openQueue({ limiter: { max: 2, duration: 400 } });
    const startsMs: number[] = [];
    void queue.process(async () => void startsMs.push(performance.now()));
    await queue.addBulk(Array.from({ length: 6 }, () => ({ data: {} })));
    await until('six runs', () => startsMs.length === 6);
    // Two a span: the fifth cannot begin before two spans are over.
    expect(startsMs[4] - startsMs[0]).toBeGreaterThanOrEqual(780);
  });

  it('keeps only so many finished jobs when given a number', async () => {
    const queue = openQueue({ defaultJobOptions: { removeOnComplete: 2, removeOnFail: 1 } });
    void queue.process(async (job) => {
      if (job.data.fail) throw new Error('no');
    });
    const jobs = await queue.addBulk([0, 0, 0, 0, 1, 1].map((fail) => ({ data: { fail } })));
    await until(
      'all finished',
      async () => (await queue.count()) === 0 && (await queue.getActiveCount()) === 0,
    );
    expect((await queue.getCompleted()).map((job) => job.id)).toEqual([jobs[3].id, jobs[2].id]);
    expect((await queue.getFailed()).map((job) => job.id)).toEqual([jobs[5].id]);
  });

  it('keeps finished jobs by age and number when given both', async () => {
    const queue = openQueue({ defaultJobOptions: { removeOnComplete: { age: 3600, count: 3 } } });
    void queue.process(async () => {});
    const jobs = await queue.addBulk(Array.from({ length: 5 }, () => ({ data: {} })));
    await until(
      'all finished',
      async () => (await queue.count()) === 0 && (await queue.getActiveCount()) === 0,
    );
    const kept = (await queue.getCompleted()).map((job) => job.id);
    expect(kept).toEqual([jobs[4].id, jobs[3].id, jobs[2].id]);
    const short = await queue.add({}, { removeOnComplete: { age: 1 } });
    await short.finished();
    await pause(2100);
    const last = await queue.add({}, { removeOnComplete: { age: 1 } });
    await last.finished();
    expect((await queue.getCompleted()).map((job) => job.id)).toEqual([last.id]);
  });

  it('pauses and resumes one worker', async () => {
    const queue = openQueue();
    const seen: number[] = [];
    void queue.process(async (job) => void seen.push(job.data.n));
    await (await queue.add({ n: 1 })).finished();
    await queue.pause(true);
    const waiting = await queue.add({ n: 2 });
    await pause(300);
    expect(seen).toEqual([1]);
    await queue.resume(true);
    await waiting.finished();
    expect(seen).toEqual([1, 2]);
  });

  it('pauses and resumes all workers', async () => {
    const producer = openQueue();
    const workers = [openQueue(), openQueue()];
    const seen: number[] = [];
    for (const worker of workers) void worker.process(async (job) => void seen.push(job.data.n));
    await producer.pause();
    await Promise.all([1, 2, 3].map((n) => producer.add({ n })));
    await pause(300);
    expect(seen).toEqual([]);
    expect(await producer.isPaused()).toBe(true);
    expect(await producer.getJobCounts()).toMatchObject({ paused: 3 });
    await producer.resume();
    await until('three runs', () => seen.length === 3);
    expect(seen.sort()).toEqual([1, 2, 3]);
  });

  it('takes a stalled job up again', async () => {
    const settings = { lockDuration: 300, stalledInterval: 150, maxStalledCount: 3 };
    const started: string[] = [];
    // The first never renews its lock: to the others it looks like a worker that died.
    const dying = openQueue({ settings: { ...settings, lockRenewTime: 3_600_000, stalledInterval: 0 } });
    void dying.process(hang(started, 'dying'));
    const job = await dying.add({});
    await until('the first start', () => started.length === 1);
    const healthy = openQueue({ settings });
    const stalled: string[] = [];
    healthy.on('stalled', (lost: Job) => stalled.push(String(lost.id)));
    void healthy.process(async () => {
      started.push('healthy');
      return 'counted';
    });
    await until('the second start', () => started.length === 2);
    expect(await job.finished()).toBe('counted');
    expect(started).toEqual(['dying', 'healthy']);
    expect(stalled).toEqual([String(job.id)]);
  });

  it('fails a job that stalled too often', async () => {
    const settings = {
      lockDuration: 300,
      lockRenewTime: 3_600_000,
      stalledInterval: 150,
      maxStalledCount: 1,
    };
    const started: string[] = [];
    const first = openQueue({ settings });
    void first.process(hang(started, 'first'));
    const job = await first.add({});
    await until('the first start', () => started.length === 1);
    const second = openQueue({ settings });
    void second.process(hang(started, 'second'));
    await expect(job.finished()).rejects.toThrow('job stalled more than');
    expect(started).toEqual(['first', 'second']);
    expect((await first.getJob(job.id))?.failedReason).toBe('job stalled more than allowable limit');
  });

  it('runs a processor in a child process', async () => {
    const queue = openQueue();
    const file = processorFile(
      'doubles.cjs',
      `module.exports = async (job) => { await job.progress(40); return { pid: process.pid, twice: job.data.n * 2 }; };`,
    );
    const progress: number[] = [];
    queue.on('progress', (_job: Job, value: number) => progress.push(value));
    void queue.process(2, file);
    const jobs = await Promise.all([3, 4].map((n) => queue.add({ n })));
    const results = await Promise.all(jobs.map((job) => job.finished()));
    expect(results.map((result) => result.twice)).toEqual([6, 8]);
    for (const result of results) expect(result.pid).not.toBe(process.pid);
    await until('both progress events', () => progress.length === 2);
    expect(progress).toEqual([40, 40]);
  });

  it('brings the exception of a child process back', async () => {
    const queue = openQueue();
    void queue.process(
      processorFile('throws.cjs', `module.exports = async () => { throw new Error('line 7: no number'); };`),
    );
    const job = await queue.add({});
    await expect(job.finished()).rejects.toThrow('line 7: no number');
  });

  it('survives the crash of a child process', async () => {
    const queue = openQueue();
    const file = processorFile(
      'crashes.cjs',
      `module.exports = async (job) => { if (job.data.crash) process.exit(3); return 'alive'; };`,
    );
    void queue.process(file);
    const crashing = await queue.add({ crash: true });
    await expect(crashing.finished()).rejects.toThrow('Unexpected exit code: 3');
    const next = await queue.add({ crash: false });
    expect(await next.finished()).toBe('alive');
  });

  it('shares work among instances and runs each job once', async () => {
    const producer = openQueue();
    const runs = new Map<string, string[]>();
    for (const label of ['a', 'b', 'c']) {
      void openQueue().process(async (job) => {
        runs.set(String(job.id), [...(runs.get(String(job.id)) ?? []), label]);
        await pause(10);
      });
    }
    const jobs = await producer.addBulk(Array.from({ length: 30 }, (_, n) => ({ data: { n } })));
    await Promise.all(jobs.map((job) => job.finished()));
    expect([...runs.keys()].sort()).toEqual(jobs.map((job) => String(job.id)).sort());
    expect([...runs.values()].every((labels) => labels.length === 1)).toBe(true);
    expect(new Set([...runs.values()].flat())).toEqual(new Set(['a', 'b', 'c']));
  });

  it('keeps logs, lets data be changed and a failed job be tried again', async () => {
    const queue = openQueue();
    let runs = 0;
    void queue.process(async (job) => {
      runs += 1;
      await job.log(`run ${runs}`);
      if (runs === 1) {
        await job.update({ ...job.data, seen: true });
        throw new Error('once');
      }
      return job.data;
    });
    const job = await queue.add({ n: 1 });
    await expect(job.finished()).rejects.toThrow('once');
    const failed = await queue.getJob(job.id);
    expect(failed?.data).toEqual({ n: 1, seen: true });
    await failed?.retry();
    await until('the second run', async () => (await job.getState()) === 'completed');
    expect((await queue.getJob(job.id))?.returnvalue).toEqual({ n: 1, seen: true });
    expect(await queue.getJobLogs(job.id)).toEqual({ logs: ['run 1', 'run 2'], count: 2 });
  });

  it('cleans finished jobs away and obliterates a whole queue', async () => {
    const queue = openQueue();
    void queue.process(async () => {});
    const jobs = await queue.addBulk(Array.from({ length: 4 }, () => ({ data: {} })));
    await Promise.all(jobs.map((job) => job.finished()));
    await pause(5);
    const cleaned = await queue.clean(0, 'completed');
    expect(cleaned.map(String).sort()).toEqual(jobs.map((job) => String(job.id)).sort());
    expect(await queue.getCompletedCount()).toBe(0);
    await queue.pause();
    await queue.add({});
    await queue.add({}, { delay: 60_000 });
    await queue.obliterate();
    expect(await queue.getJobCounts()).toMatchObject({ waiting: 0, paused: 0, delayed: 0, completed: 0 });
  });

  it('waits for the running job when it closes', async () => {
    const queue = openQueue();
    const { opened, open } = latch();
    letGo.push(open);
    let started = false;
    let finished = false;
    void queue.process(async () => {
      started = true;
      await opened;
      finished = true;
    });
    await queue.add({});
    await until('the start', () => started);
    let closed = false;
    const closing = queue.close().then(() => (closed = true));
    await pause(250);
    expect(closed).toBe(false);
    open();
    await closing;
    expect(finished).toBe(true);
  });

  it('costs next to nothing while idle, and wakes at once', async () => {
    const queue = openQueue();
    void queue.process(async () => {});
    await (await queue.add({})).finished();
    await pause(300);
    const before = process.cpuUsage();
    await pause(1500);
    const { user, system } = process.cpuUsage(before);
    // A worker that asks again and again would use the whole second and a half.
    expect((user + system) / 1000).toBeLessThan(500);
    const added = performance.now();
    await (await queue.add({})).finished();
    expect(performance.now() - added).toBeLessThan(2000);
  });

  it('works through a few hundred jobs side by side, each once', async () => {
    const queue = openQueue();
    const seen: number[] = [];
    let running = 0;
    let mostRunning = 0;
    void queue.process(20, async (job) => {
      running += 1;
      mostRunning = Math.max(mostRunning, running);
      await pause(1);
      seen.push(job.data.n);
      running -= 1;
    });
    const numbers = Array.from({ length: 300 }, (_, n) => n);
    await queue.addBulk(numbers.map((n) => ({ data: { n } })));
    await until('300 runs', () => seen.length >= 300, 40_000);
    expect([...seen].sort((a, b) => a - b)).toEqual(numbers);
    expect(mostRunning).toBeGreaterThan(1);
    expect(mostRunning).toBeLessThanOrEqual(20);
  });
});
