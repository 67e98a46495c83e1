import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable } from '@nestjs/common';
import { Clock } from '@stayledger/backend/persistence';
import { PLAN_RERIG } from '@stayledger/shared/queues/load-logs.queue';
import type { HeldJob } from '../common/job-leases.js';
import { JobRunner } from '../common/job-runner.js';
import { failPlanning, planRerig } from './plan-rerig.js';
import { PlanningThreads } from './planning-threads.js';

/** Works off the planning of re-rigs. */
@Injectable()
export class PlanningRunner extends JobRunner {
  constructor(
    em: EntityManager,
    private readonly clock: Clock,
    @Inject(PlanningThreads) private readonly threads: Pick<PlanningThreads, 'ask'>,
  ) {
    super(em, PLAN_RERIG, 'request', 'Planning broke off and is tried again.');
  }

  protected override work(job: HeldJob, signal: AbortSignal): Promise<void> {
    return planRerig({ em: this.em, clock: this.clock, threads: this.threads }, job, signal);
  }

  protected override giveUp(job: HeldJob): Promise<void> {
    return failPlanning({ em: this.em }, job, {
      code: 'interrupted',
      message: 'Planning broke off three times for reasons of the service. Ask for the plan once more.',
    });
  }
}
