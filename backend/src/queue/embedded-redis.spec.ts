import type { Redis } from 'ioredis';
import { pack } from 'msgpackr';
import { createEmbeddedRedis } from './embedded-redis.js';

/** A script as Bull defines them: called with its keys and values in one list. */
type Script = (values: unknown[]) => Promise<unknown>;

describe('embedded Redis', () => {
  let redis: Redis;
  let other: Redis;
  let scripts = 0;

  beforeEach(() => {
    redis = createEmbeddedRedis();
    other = createEmbeddedRedis();
  });

  afterEach(async () => {
    await redis.connect();
    await redis.flushall();
    redis.disconnect();
    other.disconnect();
  });

  function script(lua: string, numberOfKeys = 1): Script {
    scripts += 1;
    const name = `script${scripts}`;
    redis.defineCommand(name, { numberOfKeys, lua });
    return (redis as unknown as Record<string, Script>)[name];
  }

  it('becomes ready, ends, and can be connected again', async () => {
    await new Promise<void>((resolve) => redis.once('ready', () => resolve()));
    expect(redis.status).toBe('ready');
    redis.disconnect();
    expect(redis.status).toBe('end');
    await redis.connect();
    expect(redis.status).toBe('ready');
    expect(await redis.set('k', '1')).toBe('OK');
  });

  it('does not know CLIENT, in the words Bull listens for', async () => {
    await expect(redis.client('SETNAME', 'x')).rejects.toThrow("ERR unknown command 'client'");
  });

  describe('blocking pop', () => {
    it('waits for an element that arrives later', async () => {
      const popped = redis.brpoplpush('wait', 'active', 5);
      await other.lpush('wait', 'job-1');
      expect(await popped).toBe('job-1');
      expect(await other.lrange('active', 0, -1)).toEqual(['job-1']);
    });

    it('gives each element to one of several waiting', async () => {
      const first = redis.brpoplpush('wait', 'active', 0.3);
      const second = other.brpoplpush('wait', 'active', 0.3);
      const third = other.brpoplpush('wait', 'active', 0.3);
      await redis.lpush('wait', 'a');
      await redis.lpush('wait', 'b');
      const results = await Promise.all([first, second, third]);
      expect([...results].sort()).toEqual(['a', 'b', null]);
    });

    it('ends empty-handed after its time', async () => {
      const asked = performance.now();
      expect(await redis.brpoplpush('wait', 'active', 0.2)).toBeNull();
      expect(performance.now() - asked).toBeGreaterThanOrEqual(195);
    });

    it('ends with the connection and leaves later elements alone', async () => {
      const popped = redis.brpoplpush('wait', 'active', 5);
      redis.disconnect();
      await expect(popped).rejects.toThrow('Connection is closed.');
      await other.lpush('wait', 'job-1');
      await new Promise((resolve) => setTimeout(resolve, 20));
      expect(await other.lrange('wait', 0, -1)).toEqual(['job-1']);
    });
  });

  describe('scripts', () => {
    it('glue whole numbers into keys without a fraction', async () => {
      await script(`local n = redis.call('INCR', KEYS[1]); redis.call('SET', 'job:' .. n, n)`)(['counter']);
      expect(await redis.get('job:1')).toBe('1');
    });

    it('pass numbers on with all their digits', async () => {
      await script(`redis.call('ZADD', KEYS[1], tonumber(ARGV[1]) * 0x1000, 'm')`)(['z', '1733000000123']);
      // 1733000000123 x 4096 by hand: 1733000000123 x 4000 + 1733000000123 x 96
      expect(await redis.zscore('z', 'm')).toBe('7098368000503808');
    });

    it('see an absent value as false', async () => {
      expect(await script(`if redis.call('GET', KEYS[1]) == false then return 'absent' end`)(['none'])).toBe(
        'absent',
      );
    });

    it('can measure and unpack lists', async () => {
      await redis.rpush('list', 'a', 'b', 'c');
      const joined = await script(`
        local list = redis.call('LRANGE', KEYS[1], 0, -1)
        return #list .. table.concat({ unpack(list) })`)(['list']);
      expect(joined).toBe('3abc');
    });

    it('return lists built in any order, cut numbers and turn nothing into null', async () => {
      const reply = await script(`
        local list = {}
        list[#list + 1] = 'first'
        list[#list + 1] = 2.9
        list[#list + 1] = { 'inner', true }
        list[#list + 1] = false
        return list`)(['k']);
      expect(reply).toEqual(['first', 2, ['inner', 1], null]);
      expect(await script(`return nil`)(['k'])).toBeNull();
      expect(await script(`return {}`)(['k'])).toEqual([]);
    });

    it('mask bits', async () => {
      // 4099 = 0x1003
      expect(await script(`return bit.band(tonumber(ARGV[1]), 0xfff)`)(['k', '4099'])).toBe(3);
    });

    it('read MessagePack', async () => {
      const read = script(`
        local o = cmsgpack.unpack(ARGV[1])
        return { o.name, o.count, o.on, o.list[2], type(o.none), o.deep.half .. '' }`);
      const packed = pack({
        name: 'Ünté 🪢',
        count: 7,
        on: true,
        list: [1, 'two'],
        none: null,
        deep: { half: 0.5 },
      });
      expect(await read(['k', packed])).toEqual(['Ünté 🪢', 7, 1, 'two', 'nil', '0.5']);
    });

    it('read JSON with every escape', async () => {
      const read = script(
        `local o = cjson.decode(ARGV[1]); return { o.text, #o.empty, o.n .. '', type(o.off) }`,
      );
      const json =
        '{ "text" : "a\\"\\\\\\/\\n\\t\\u00e9\\ud83e\\udea2" , "empty":[ ], "n":-1.5e3,"off":false}';
      expect(await read(['k', json])).toEqual(['a"\\/\n\té🪢', 0, '-1500', 'boolean']);
    });

    it('refuse broken JSON instead of hanging', async () => {
      for (const broken of ['{"a":1', '["a"', '"open', '{"a" 1 2}', 'nonsense']) {
        await expect(script(`return cjson.decode(ARGV[1])`)(['k', broken])).rejects.toThrow();
      }
    });

    it('take part in a transaction', async () => {
      redis.defineCommand('bump', { numberOfKeys: 1, lua: `return redis.call('INCR', KEYS[1])` });
      const block = redis.multi() as unknown as Record<'bump', (key: string) => void> & {
        exec(): Promise<unknown>;
      };
      block.bump('n');
      block.bump('n');
      expect(await block.exec()).toEqual([
        [null, 1],
        [null, 2],
      ]);
    });
  });
});
