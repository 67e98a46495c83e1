import { randomBytes } from 'node:crypto';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { mkdtemp, rm } from 'node:fs/promises';
import type { ModuleMetadata } from '@nestjs/common';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { Test } from '@nestjs/testing';
import supertest from 'supertest';
import { AppModule } from '../app.module.js';
import { configureApp } from '../app.js';
import { Clock } from '../common/clock/clock.js';
import { THROTTLE_LIMITS, type ThrottleLimits } from '../common/http/throttling.js';
import { AppLogger } from '../common/logging/app-logger.js';
import { ENV } from '../config/config.module.js';
import { parseEnv, type Env } from '../config/env.js';
import { Factories, TEST_PASSWORD } from './factories.js';
import { TestClock } from './test-clock.js';
import { createTestDatabase, type TestDatabase } from './test-database.js';

export type Agent = ReturnType<typeof supertest.agent>;

export interface TestAppOptions {
  /** Variables that differ from the test's own. */
  env?: Record<string, string>;
  /** Modules beside the application, such as one with a route made for the test. */
  imports?: ModuleMetadata['imports'];
  /** Generous unless the test is about them. */
  limits?: Partial<ThrottleLimits>;
  webAppFolder?: string;
}

/** The real application over real HTTP on a database of its own. Close it in `afterAll`. */
export class TestApp {
  private constructor(
    readonly nest: NestExpressApplication,
    readonly database: TestDatabase,
    readonly make: Factories,
    readonly clock: TestClock,
    readonly env: Env,
    private readonly dataFolder: string,
  ) {}

  static async create(options: TestAppOptions = {}): Promise<TestApp> {
    const database = await createTestDatabase();
    const dataFolder = await mkdtemp(join(tmpdir(), 'stayledger-test-'));
    const env = parseEnv({
      NODE_ENV: 'test',
      PORT: '0',
      DATABASE_APP_URL: database.appUrl,
      STAYLEDGER_DATA: dataFolder,
      SESSION_SECRET: randomBytes(24).toString('hex'),
      LOG_LEVEL: 'error',
      ...options.env,
    });
    const clock = new TestClock();
    const limits: ThrottleLimits = { perMinute: 1e6, guessesPerMinute: 1e6, ...options.limits };
    const testing = await Test.createTestingModule({ imports: [AppModule, ...(options.imports ?? [])] })
      .overrideProvider(ENV)
      .useValue(env)
      .overrideProvider(Clock)
      .useValue(clock)
      .overrideProvider(THROTTLE_LIMITS)
      .useValue(limits)
      .compile();
    const nest = testing.createNestApplication<NestExpressApplication>({
      bodyParser: false,
      logger: new AppLogger(env),
    });
    configureApp(nest, options.webAppFolder);
    await nest.listen(0, '127.0.0.1');
    return new TestApp(nest, database, new Factories(database.admin, clock), clock, env, dataFolder);
  }

  get url(): string {
    const address = this.nest.getHttpServer().address() as { port: number };
    return `http://127.0.0.1:${address.port}`;
  }

  /** A browser tab of ours: keeps its cookies and sends what our pages send. Nobody is signed in. */
  agent(): Agent {
    return supertest.agent(this.url).set({ 'Sec-Fetch-Site': 'same-origin', 'X-Requested-By': 'stayledger' });
  }

  /** A browser tab with this person signed in. */
  async signIn(user: { email: string }, password = TEST_PASSWORD): Promise<Agent> {
    const agent = this.agent();
    await agent.post('/api/auth/sign-in').send({ email: user.email, password }).expect(200);
    return agent;
  }

  async close(): Promise<void> {
    await this.nest.close();
    await this.database.drop();
    await rm(this.dataFolder, { recursive: true, force: true });
  }
}
