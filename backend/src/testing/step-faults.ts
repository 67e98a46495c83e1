import { createRequire } from 'node:module';
import { Client } from 'pg';

/** When a step fails: before it has done anything, or after it is done but before anybody hears of it. */
export type FaultMoment = 'before' | 'after';

type AnyFunction = (...values: unknown[]) => unknown;

const FILE_CALLS = ['mkdir', 'open', 'rename', 'rm', 'stat', 'statfs', 'readdir'] as const;
/** Files and connections of the service, not of the test. */
const APPLICATION = /^stayledger/;

/**
 * Lets the n-th call to the database or to a file fail, counted from `arm()`. A failing call to the database cuts its
 * connection, as a dying server does; a failing call to a file says that the device cannot be read or written (EIO).
 */
export class StepFaults {
  /** Calls since `arm()`. */
  steps = 0;
  private failing: { at: number; moment: FaultMoment } | null = null;
  private hit: string | null = null;
  private readonly undo: (() => void)[] = [];

  /** @param folder whose files count */
  constructor(private readonly folder: string) {
    this.watchDatabase();
    this.watchFiles();
  }

  arm(at: number, moment: FaultMoment): void {
    this.steps = 0;
    this.hit = null;
    this.failing = { at, moment };
  }

  /** @returns which call failed; null when there were fewer than it was armed for */
  disarm(): string | null {
    this.failing = null;
    return this.hit;
  }

  end(): void {
    for (const undo of this.undo.splice(0)) undo();
  }

  /** Counts a call; when it is its turn, says when to fail. */
  private step(what: string): FaultMoment | null {
    if (this.failing === null) return null;
    this.steps += 1;
    if (this.steps !== this.failing.at) return null;
    this.hit = what;
    return this.failing.moment;
  }

  private watchDatabase(): void {
    const original = Client.prototype.query as AnyFunction;
    const step = (what: string) => this.step(what);
    Client.prototype.query = function (this: Client, ...values: unknown[]) {
      const { connectionParameters, connection } = this as unknown as {
        connectionParameters: { application_name?: string };
        connection: { stream: { destroy(): void } };
      };
      const ours = APPLICATION.test(connectionParameters.application_name ?? '');
      const moment = ours ? step(textOf(values[0])) : null;
      if (moment === null) return original.apply(this, values);
      const cut = () => connection.stream.destroy();
      if (moment === 'before') {
        cut();
        return original.apply(this, values);
      }
      const lost = new Error('Connection terminated unexpectedly');
      const callback = values.at(-1);
      if (typeof callback === 'function') {
        const tell = callback as AnyFunction;
        return original.apply(this, [
          ...values.slice(0, -1),
          (error: unknown) => {
            cut();
            tell(error ?? lost);
          },
        ]);
      }
      return (original.apply(this, values) as Promise<unknown>).then(() => {
        cut();
        throw lost;
      });
    } as typeof Client.prototype.query;
    this.undo.push(() => {
      Client.prototype.query = original as typeof Client.prototype.query;
    });
  }

  private watchFiles(): void {
    // The object that the service's imports look into at each call.
    const files = createRequire(__filename)('node:fs/promises') as Record<string, AnyFunction>;
    for (const name of FILE_CALLS) {
      const original = files[name];
      files[name] = async (...values: unknown[]) => {
        const ours = typeof values[0] === 'string' && values[0].startsWith(this.folder);
        const moment = ours ? this.step(`${name} of a file`) : null;
        if (moment === 'before') throw inputOutputError(name);
        const result = await original(...values);
        if (moment === 'after') {
          if (name === 'open') await (result as { close(): Promise<void> }).close();
          throw inputOutputError(name);
        }
        return result;
      };
      this.undo.push(() => {
        files[name] = original;
      });
    }
  }
}

function textOf(query: unknown): string {
  const text =
    typeof query === 'string' ? query : String((query as { text?: unknown } | null)?.text ?? 'a statement');
  return text.replace(/\s+/g, ' ').slice(0, 60);
}

function inputOutputError(name: string): Error {
  return Object.assign(new Error(`EIO: i/o error, ${name}`), { code: 'EIO', syscall: name });
}
