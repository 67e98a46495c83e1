import { Redis, type RedisOptions } from 'ioredis';
import { readEnv } from '../config/env.js';
import { createEmbeddedRedis } from './embedded-redis.js';

/** The three connections a Bull queue asks for: commands, events, and the one that waits for work. */
export type QueueClientType = 'client' | 'subscriber' | 'bclient';

/** Where the queue lives: inside this process, or on the server that REDIS_URL names. */
export type QueueBackEnd = 'embedded' | 'redis';

/**
 * Makes Bull's connections and remembers them. Bull closes only connections it made itself, so `disconnect()` is for
 * the end of the process, after the queues were closed.
 */
export class QueueClients {
  readonly #clients: Redis[] = [];

  /** @param redisUrl address of a Redis server; without one the queue lives inside this process. */
  constructor(private readonly redisUrl: string | undefined) {}

  get backEnd(): QueueBackEnd {
    return this.redisUrl === undefined ? 'embedded' : 'redis';
  }

  /** For `createClient` in Bull's queue options. Each call gives a connection of its own: they cannot be shared. */
  create(type: QueueClientType, options: RedisOptions = {}): Redis {
    // A waiting or listening connection must outlast any number of lost connections; Bull refuses it otherwise.
    const settings =
      type === 'client' ? options : { ...options, maxRetriesPerRequest: null, enableReadyCheck: false };
    const client =
      this.redisUrl === undefined ? createEmbeddedRedis(settings) : new Redis(this.redisUrl, settings);
    this.#clients.push(client);
    return client;
  }

  /** Ends every connection made so far, without waiting for replies. */
  disconnect(): void {
    for (const client of this.#clients.splice(0)) client.disconnect();
  }
}

let processClients: QueueClients | undefined;

/** The connections of this process, chosen by REDIS_URL. */
export function queueClients(): QueueClients {
  processClients ??= new QueueClients(readEnv().REDIS_URL);
  return processClients;
}

/** Bull's `createClient` for this process. */
export function createQueueClient(type: QueueClientType, options?: RedisOptions): Redis {
  return queueClients().create(type, options);
}

/** Ends the queue connections of this process; call it after the queues were closed. */
export function disconnectQueueClients(): void {
  processClients?.disconnect();
}
