import type { Env } from '../config/env.js';

/** Key of the service setting that keeps the demo's people and the day of its first start. */
export const DEMO_SETTING = 'demo';

export interface DemoSetting {
  /** 'YYYY-MM-DD'. Every date of the demo is counted from here, so its story stays true as days pass. */
  firstDayOn: string;
  users: { id: string; email: string; role: string; name: string }[];
}

/**
 * The password of every demo account, printed by `npm start` and offered on the sign-in page. It is no secret,
 * therefore these accounts open only where `demoIsOpen` holds.
 */
export const DEMO_PASSWORD = 'lee rail under, ledger dry';

/** Demo sign-ins work only where nobody but this machine can try them. */
export function demoIsOpen(env: Env): boolean {
  return env.STAYLEDGER_DEMO && ['127.0.0.1', '::1', 'localhost'].includes(env.HOST);
}
