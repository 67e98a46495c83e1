import type { EntityManager } from '@mikro-orm/postgresql';
import { DEMO_SETTING, demoIsOpen, type DemoSetting } from '../../auth/demo.js';
import type { Env } from '../../config/env.js';
import { ServiceSetting } from '../service-setting.entity.js';

/** What the demo's logs are made from: in whose name they come in, and from which day its dates are counted. */
export interface DemoStart {
  userId: string;
  firstDayOn: string;
}

/** Null where no demo runs. */
export async function readDemo(env: Env, em: EntityManager): Promise<DemoStart | null> {
  if (!demoIsOpen(env)) return null;
  const setting = await em.fork().findOne(ServiceSetting, { key: DEMO_SETTING });
  const demo = setting?.value as DemoSetting | undefined;
  const rigger = demo?.users.find(({ role }) => role === 'rigger');
  return demo && rigger ? { userId: rigger.id, firstDayOn: demo.firstDayOn } : null;
}
