import { Readable } from 'node:stream';
import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable } from '@nestjs/common';
import type { LoadLogDto, LogMapping } from '@stayledger/shared/contracts/load-logs';
import { type Principal, reachOf } from '../auth/principal.js';
import { PrincipalsService } from '../auth/principals.service.js';
import { inReach } from '../database/reach.js';
import { LOG_STORAGE, type LogStorage } from '../storage/log-storage.js';
import { User } from '../users/user.entity.js';
import { DecisionsService } from './decisions.service.js';
import { LoadLogsService } from './load-logs.service.js';
import { LogReceiver } from './log-receiver.js';

/** A log that is here already, to be taken in as if somebody had uploaded it. */
export interface LogAtHand {
  vesselId: string;
  userId: string;
  fileName: string;
  mapping: LogMapping;
  bytes: Buffer;
}

/**
 * Takes in logs from within the process, in the name of a person, by the same steps as an upload: announced, received,
 * taken over, counted by the worker, decided about. What the person may not do fails here as it does over HTTP.
 */
@Injectable()
export class LogIntake {
  constructor(
    private readonly em: EntityManager,
    private readonly principals: PrincipalsService,
    private readonly logs: LoadLogsService,
    private readonly decisions: DecisionsService,
    private readonly receiver: LogReceiver,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {}

  /** Logs of a vessel the person can see, newest first; the first 200. */
  list(userId: string, vesselId: string): Promise<LoadLogDto[]> {
    return this.as(userId, async (me) => (await this.logs.list(me, vesselId, { limit: 200 })).items);
  }

  /** @returns the log, received and waiting to be counted */
  async receive({ vesselId, userId, fileName, mapping, bytes }: LogAtHand): Promise<LoadLogDto> {
    const log = await this.as(userId, (me) =>
      this.logs.announce(me, vesselId, { fileName, sizeBytes: bytes.length, mapping }),
    );
    const key = { vesselId, loadLogId: log.id };
    await this.storage.begin(key);
    await this.storage.append(key, 0, Readable.from([bytes]));
    await this.receiver.takeOver(key);
    return this.get(userId, log.id);
  }

  get(userId: string, loadLogId: string): Promise<LoadLogDto> {
    return this.as(userId, (me) => this.logs.get(me, loadLogId));
  }

  /** Posts a counted log as it stands. */
  post(userId: string, log: Pick<LoadLogDto, 'id' | 'version'>): Promise<LoadLogDto> {
    return this.as(userId, (me) => this.decisions.post(me, log.id, { version: log.version }));
  }

  private async as<T>(userId: string, work: (me: Principal) => Promise<T>): Promise<T> {
    const user = await this.em.fork().findOneOrFail(User, userId);
    const me = await this.principals.ofUser(user);
    return inReach(this.em.fork(), reachOf(me), () => work(me));
  }
}
