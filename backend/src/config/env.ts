import { availableParallelism } from 'node:os';
import { resolve } from 'node:path';
import { z } from 'zod';

/**
 * The one reader of the environment for the API, the worker and the set-up commands. Every variable is described
 * for people in backend/.env.example; a spec keeps the two lists equal.
 */

function urlWith(...protocols: string[]) {
  return z.string().refine((value) => URL.canParse(value) && protocols.includes(new URL(value).protocol), {
    error: `must be an address that begins with ${protocols.map((protocol) => `${protocol}//`).join(' or ')}`,
  });
}

function wholeNumber(min: number, max: number) {
  const error = `must be a whole number from ${min} to ${max}`;
  return z
    .string()
    .regex(/^\d{1,9}$/, { error })
    .transform(Number)
    .refine((value) => value >= min && value <= max, { error });
}

const postgresUrl = urlWith('postgres:', 'postgresql:');

export const envSchema = z.object({
  NODE_ENV: z
    .enum(['development', 'test', 'production'], { error: 'must be development, test or production' })
    .default('development'),
  HOST: z.string().default('127.0.0.1'),
  PORT: wholeNumber(0, 65535).default(3000),
  PUBLIC_URL: urlWith('http:', 'https:')
    .transform((value) => value.replace(/\/+$/, ''))
    .optional(),
  TRUST_PROXY: wholeNumber(0, 10).default(0),
  DATABASE_APP_URL: postgresUrl,
  DATABASE_OWNER_URL: postgresUrl.optional(),
  REDIS_URL: urlWith('redis:', 'rediss:').optional(),
  SMTP_URL: urlWith('smtp:', 'smtps:').optional(),
  STAYLEDGER_DATA: z
    .string()
    .default('.data')
    .transform((value) => resolve(value)),
  SESSION_SECRET: z.string().min(32, { error: 'must have at least 32 characters' }),
  STAYLEDGER_DEMO: z
    .enum(['0', '1'], { error: 'must be 0 or 1' })
    .default('0')
    .transform((value) => value === '1'),
  COUNTING_THREADS: wholeNumber(1, 64).default(() => Math.max(1, availableParallelism() - 1)),
  LOG_LEVEL: z
    .enum(['error', 'warn', 'info', 'debug'], { error: 'must be error, warn, info or debug' })
    .default('info'),
});

/** What the server and the worker know about their surroundings. Addresses carry passwords: never log one. */
export type Env = z.infer<typeof envSchema>;

/** What the migration and seed commands need. They connect as the owner and never serve anybody. */
export type OwnerEnv = Pick<Env, 'NODE_ENV' | 'STAYLEDGER_DATA' | 'STAYLEDGER_DEMO' | 'LOG_LEVEL'> & {
  DATABASE_OWNER_URL: string;
};

/** All that is wrong with the environment, one line for each variable. */
export class EnvironmentError extends Error {
  constructor(readonly complaints: readonly string[]) {
    super(
      [
        'The environment is not complete:',
        ...complaints.map((complaint) => `  ${complaint}`),
        'Every variable is described in backend/.env.example.',
      ].join('\n'),
    );
    this.name = 'EnvironmentError';
  }
}

type Source = Readonly<Record<string, string | undefined>>;

function parse<T extends z.ZodType>(schema: T, source: Source): z.infer<T> {
  // `REDIS_URL=` in an env file means "not set", as it does in a shell test for emptiness.
  const given = Object.fromEntries(Object.entries(source).filter(([, value]) => value?.trim()));
  const result = schema.safeParse(given);
  if (result.success) return result.data;
  throw new EnvironmentError(
    result.error.issues.map((issue) => {
      const name = String(issue.path[0]);
      // The value itself stays out of the message: it may hold a password and ends up in logs.
      return given[name] === undefined ? `${name} is not set` : `${name} ${issue.message}`;
    }),
  );
}

/** Checks an environment for the server or the worker. Throws `EnvironmentError` with every complaint at once. */
export function parseEnv(source: Source): Env {
  return parse(envSchema, source);
}

/** Checks an environment for the migration and seed commands, which need the owner's address and nothing secret else. */
export function parseOwnerEnv(source: Source): OwnerEnv {
  const schema = envSchema
    .pick({ NODE_ENV: true, STAYLEDGER_DATA: true, STAYLEDGER_DEMO: true, LOG_LEVEL: true })
    .extend({ DATABASE_OWNER_URL: postgresUrl });
  return parse(schema, source);
}

let known: Env | undefined;

/** The environment of this process, read once. */
export function readEnv(): Env {
  known ??= parseEnv(process.env);
  return known;
}

/** The environment of this process for the migration and seed commands. */
export function readOwnerEnv(): OwnerEnv {
  return parseOwnerEnv(process.env);
}
