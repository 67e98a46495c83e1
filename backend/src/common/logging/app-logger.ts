import { ConsoleLogger, type LogLevel } from '@nestjs/common';
import type { Env } from '../../config/env.js';
import { currentRequestId } from '../http/request-context.js';

const LEVELS: Record<Env['LOG_LEVEL'], LogLevel[]> = {
  error: ['fatal', 'error'],
  warn: ['fatal', 'error', 'warn'],
  info: ['fatal', 'error', 'warn', 'log'],
  debug: ['fatal', 'error', 'warn', 'log', 'debug'],
};

/** The framework tells of every module and route it finds; nobody wants to know tomorrow. */
const CHATTER = new Set([
  'InstanceLoader',
  'RouterExplorer',
  'RoutesResolver',
  'NestFactory',
  'NestApplication',
]);

/** One line of JSON per event in production, plain text otherwise; each line of a request carries its id. */
export class AppLogger extends ConsoleLogger {
  constructor(env: Pick<Env, 'LOG_LEVEL' | 'NODE_ENV'>) {
    super({ json: env.NODE_ENV === 'production', logLevels: LEVELS[env.LOG_LEVEL], colors: false });
  }

  override log(message: unknown, ...rest: unknown[]): void {
    const context = rest.at(-1);
    if (typeof context === 'string' && CHATTER.has(context)) return;
    super.log(message, ...rest);
  }

  protected override getJsonLogObject(
    message: unknown,
    options: Parameters<ConsoleLogger['getJsonLogObject']>[1],
  ) {
    return { ...super.getJsonLogObject(message, options), requestId: currentRequestId() };
  }

  protected override formatContext(context: string): string {
    const requestId = currentRequestId();
    return super.formatContext(requestId ? `${context} ${requestId}` : context);
  }
}
