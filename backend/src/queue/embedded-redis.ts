import type { EventEmitter } from 'node:events';
import type { Redis, RedisOptions } from 'ioredis';
import RedisMock from 'ioredis-mock';
import { unpack } from 'msgpackr';
import { bridgeScript } from './embedded-redis-lua.js';

/**
 * The queue's Redis inside our own process, for installations without a Redis server: an `ioredis-mock` client with
 * the gaps closed that keep Bull from running on it. Everything lives in memory and ends with the process; that is
 * fine, because PostgreSQL holds the work and the queue only wakes workers.
 *
 * Made for ioredis-mock 8.13.1 and bull 4.16.5 and leaning on inner parts of the first (`context`, `connected`,
 * `customCommands`), so both are pinned. `queue-backends.int.spec.ts` runs the same cases here and against a real server.
 */

type Command = (...values: unknown[]) => Promise<unknown>;
type Callback = (error: unknown, reply?: unknown) => void;

/** The parts of the mock that are touched here. Its published types only describe a real client. */
interface MockClient extends EventEmitter {
  connected: boolean;
  status: 'wait' | 'ready' | 'end';
  readonly context: { readonly modifiedKeyEvents: EventEmitter };
  readonly customCommands: Record<string, Command>;
  rpoplpush(source: string, destination: string): Promise<string | null>;
  brpoplpush: (source: string, destination: string, timeoutS?: number) => Promise<string | null>;
  client: Command;
  connect: () => Promise<void>;
  disconnect: () => void;
  defineCommand: (name: string, definition: { numberOfKeys?: number; lua: string }) => void;
}

/** Bull waits for `status` to become `ready` before it sends anything; the mock has no `status` at all. */
function keepStatus(client: MockClient): void {
  client.status = client.connected ? 'ready' : 'wait';
  client.on('ready', () => {
    client.status = 'ready';
  });
  client.on('end', () => {
    client.status = 'end';
  });
}

/**
 * Pausing a queue cuts its blocked connection and connects it again later. The mock refuses a second `connect`, and
 * its first one resolves before the client is ready.
 */
function allowReconnecting(client: MockClient): void {
  client.connect = async () => {
    if (client.status === 'ready') return;
    const ready = new Promise<void>((resolve) => client.once('ready', () => resolve()));
    client.connected = true;
    process.nextTick(() => {
      client.emit('connect');
      client.emit('ready');
    });
    await ready;
  };
}

/**
 * `CLIENT SETNAME` and `CLIENT LIST` are conveniences to Bull: it carries on when the server says that it does not
 * know the command, and only when it says so in these words. The mock throws words of its own.
 */
function declineClientCommand(client: MockClient): void {
  client.client = () => Promise.reject(new Error("ERR unknown command 'client'"));
}

/**
 * An idle worker waits in BRPOPLPUSH. The mock answers at once instead of waiting, and the worker would ask again at
 * once, for ever. Here the wait ends with an element, with the timeout, or with the connection.
 */
function waitInBlockingPop(client: MockClient): void {
  const { modifiedKeyEvents } = client.context;
  const waiting = new Set<() => void>();

  client.brpoplpush = (source, destination, timeoutS = 0) =>
    new Promise((resolve, reject) => {
      let timer: NodeJS.Timeout | undefined;
      let tryQueued = false;

      const settle = (report: () => void) => {
        clearTimeout(timer);
        modifiedKeyEvents.off('modified', onModified);
        waiting.delete(giveUp);
        report();
      };
      const giveUp = () => settle(() => reject(new Error('Connection is closed.')));
      const tryToPop = async () => {
        tryQueued = false;
        if (!waiting.has(giveUp)) return;
        try {
          const element = await client.rpoplpush(source, destination);
          if (element !== null && element !== undefined) settle(() => resolve(element));
        } catch (error) {
          settle(() => reject(error));
        }
      };
      // The event comes from within the command that changed the key, possibly in the middle of a script, which
      // must look indivisible: hence the pop in a later turn.
      const onModified = (key: unknown) => {
        if (tryQueued || String(key) !== source) return;
        tryQueued = true;
        setImmediate(() => void tryToPop());
      };

      waiting.add(giveUp);
      modifiedKeyEvents.on('modified', onModified);
      if (timeoutS > 0) timer = setTimeout(() => settle(() => resolve(null)), timeoutS * 1000);
      void tryToPop();
    });

  const disconnect = client.disconnect.bind(client);
  client.disconnect = () => {
    client.status = 'end';
    for (const giveUp of [...waiting]) giveUp();
    disconnect();
  };
}

/** MessagePack goes into a script as JSON: the script side has one decoder for both. */
function asScriptArgument(value: unknown): unknown {
  return Buffer.isBuffer(value) ? JSON.stringify(unpack(value)) : value;
}

/** Lua's `false` is how a script says "nothing"; a client sees it as `null`. */
function asClientReply(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(asClientReply);
  return value === false || value === undefined ? null : value;
}

/** Gives each script the surroundings of a real server (see embedded-redis-lua.ts) and converts at both ends. */
function bridgeScripts(client: MockClient): void {
  const define = client.defineCommand.bind(client);
  client.defineCommand = (name, definition) => {
    define(name, { ...definition, lua: bridgeScript(definition.lua) });
    const plain = client.customCommands[name];
    const bridged: Command = (...values) => {
      const last = values[values.length - 1];
      const callback = typeof last === 'function' ? (values.pop() as Callback) : undefined;
      const reply = plain(...values.flat().map(asScriptArgument)).then(asClientReply);
      if (callback) reply.then((value) => callback(null, value), callback);
      return reply;
    };
    // The client calls the first, a MULTI block the second.
    Object.assign(client, { [name]: bridged });
    client.customCommands[name] = bridged;
  };
}

/**
 * A client of the in-process Redis that Bull 4 can work with. Clients made with the same host, port and database
 * number share their data, as long as they are in one process.
 */
export function createEmbeddedRedis(options: RedisOptions = {}): Redis {
  // The mock's types promise a full ioredis client; what is really inside is described by MockClient.
  const redis = new RedisMock(options);
  const client = redis as unknown as MockClient;
  // Each client and each waiting pop listens there; Node would take that for a leak.
  client.context.modifiedKeyEvents.setMaxListeners(0);
  keepStatus(client);
  allowReconnecting(client);
  declineClientCommand(client);
  waitInBlockingPop(client);
  bridgeScripts(client);
  return redis;
}
