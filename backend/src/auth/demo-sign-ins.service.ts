import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable } from '@nestjs/common';
import { demoSignInsSchema, type DemoSignInsDto } from '@stayledger/shared/contracts/auth';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { ServiceSetting } from '../database/service-setting.entity.js';
import { DEMO_PASSWORD, DEMO_SETTING, demoIsOpen, type DemoSetting } from './demo.js';

@Injectable()
export class DemoSignInsService {
  constructor(
    private readonly em: EntityManager,
    @Inject(ENV) private readonly env: Env,
  ) {}

  async list(): Promise<DemoSignInsDto> {
    const setting = demoIsOpen(this.env)
      ? await this.em.findOne(ServiceSetting, { key: DEMO_SETTING })
      : null;
    const users = (setting?.value as DemoSetting | undefined)?.users ?? [];
    return demoSignInsSchema.parse({
      items: users.map(({ email, role, name }) => ({ email, password: DEMO_PASSWORD, role, name })),
    });
  }
}
