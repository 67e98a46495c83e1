import { join } from 'node:path';
import { Module } from '@nestjs/common';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { LocalFolderLogStorage } from './local-folder-log-storage.js';
import { LOG_STORAGE } from './log-storage.js';

/** The files of the service, below STAYLEDGER_DATA. */
@Module({
  providers: [
    {
      provide: LOG_STORAGE,
      inject: [ENV],
      useFactory: (env: Env) => new LocalFolderLogStorage(join(env.STAYLEDGER_DATA, 'files')),
    },
  ],
  exports: [LOG_STORAGE],
})
export class StorageModule {}
