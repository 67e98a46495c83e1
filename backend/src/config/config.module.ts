import { Global, Module } from '@nestjs/common';
import { readEnv } from './env.js';

/** Injection token of the checked environment (`Env`). Tests put their own in its place. */
export const ENV = Symbol('ENV');

@Global()
@Module({ providers: [{ provide: ENV, useFactory: readEnv }], exports: [ENV] })
export class ConfigModule {}
