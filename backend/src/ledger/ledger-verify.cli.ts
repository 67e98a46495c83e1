import 'reflect-metadata';
import { TableNotFoundException } from '@mikro-orm/core';
import { Clock } from '../common/clock/clock.js';
import { readOwnerEnv } from '../config/env.js';
import { asOwner } from '../database/owner-command.js';
import { withAccess } from '../database/reach.js';
import { AccountService } from './account.service.js';
import { LedgerCheck } from './ledger-check.js';
import { ledgerReport, summaryOf } from './ledger-report.js';
import { PartHistory } from './part-history.js';

/**
 * `node backend/dist/ledger/ledger-verify.cli.js`: checks the ledgers of all vessels. Ends with 0 when everything
 * holds, 1 when something differs, 2 when it could not be checked.
 */
async function verify(): Promise<number> {
  const { DATABASE_OWNER_URL } = readOwnerEnv();
  const clock = new Clock();
  const check = new LedgerCheck(new AccountService(new PartHistory(), clock), clock);
  return asOwner(DATABASE_OWNER_URL, async (orm) => {
    const vessels = await orm.em
      .fork()
      .execute<{ vessel_id: string }[]>('select distinct vessel_id from vessel_access order by vessel_id');
    const checks = [];
    for (const { vessel_id: vesselId } of vessels) {
      const one = await withAccess(orm.em, { vesselId }, (em) => check.ofVessel(em, vesselId));
      console.log(ledgerReport(one));
      checks.push(one);
    }
    console.log(summaryOf(checks));
    return checks.every(({ differences }) => differences.length === 0) ? 0 : 1;
  });
}

verify().then(
  (code) => {
    process.exitCode = code;
  },
  (error: unknown) => {
    if (error instanceof TableNotFoundException) {
      console.error(
        'This database holds no ledgers yet, or is older than this command: npm start brings it up to date.',
      );
    } else {
      console.error(error instanceof Error && error.name === 'EnvironmentError' ? error.message : error);
    }
    process.exitCode = 2;
  },
);
