import { Redis, type RedisOptions } from 'ioredis';
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
