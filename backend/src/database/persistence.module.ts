import { MikroOrmModule } from '@mikro-orm/nestjs';
import { Module } from '@nestjs/common';
import { PostgreSqlDriver } from '@mikro-orm/postgresql';
import type { Env } from '../config/env.js';
import { ENV } from '../config/config.module.js';
import { ormOptions } from './mikro-orm.config.js';
import { SchemaIsCurrent } from './schema-is-current.js';

/**
 * The one ORM of a process. API and worker import this class; calling `forRoot` in both would give two ORMs as soon
 * as they share a process.
 */
@Module({
  imports: [
    MikroOrmModule.forRootAsync({
      driver: PostgreSqlDriver,
      inject: [ENV],
      useFactory: (env: Env) => ormOptions(env.DATABASE_APP_URL),
    }),
  ],
  providers: [SchemaIsCurrent],
})
export class PersistenceModule {}
