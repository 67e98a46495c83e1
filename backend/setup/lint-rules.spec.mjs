import * as fs from 'node:fs';
import * as path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ESLint } from 'eslint';
import { describe, expect, it } from 'vitest';

/** The rules of eslint.config.mjs must fire where they should and only there. Each snippet is linted as if it lay at the path. */

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
// The type-aware rules need a file on disk, which a snippet is not; for them the last test reads the settings.
const untyped = { languageOptions: { parserOptions: { projectService: false } } };
const typedRules = ['no-floating-promises', 'no-misused-promises', 'await-thenable'];
const eslint = new ESLint({
  cwd: ROOT,
  overrideConfig: [
    {
      files: ['**/*.ts'],
      ...untyped,
      rules: Object.fromEntries(typedRules.map((name) => [`@typescript-eslint/${name}`, 'off'])),
    },
  ],
});

async function complaints(filePath, code) {
  const [result] = await eslint.lintText(code, { filePath: path.join(ROOT, filePath) });
  return result.messages
    .filter(({ ruleId }) => ruleId === null || /^no-restricted-/.test(ruleId))
    .map(({ ruleId, message }) => `${ruleId}: ${message}`);
}

/** [where, what, words of the message] */
const FORBIDDEN_IMPORTS = [
  ['shared/src/units/length.ts', '../contracts/values.js', 'bottom'],
  ['shared/src/units/length.ts', 'zod', 'bottom'],
  ['shared/src/fatigue/rainflow/x.ts', 'zod', 'pure'],
  ['shared/src/fatigue/rainflow/x.ts', 'node:fs', 'pure'],
  ['shared/src/fatigue/rainflow/x.ts', 'mathjs', 'pure'],
  ['shared/src/fatigue/rainflow/x.ts', 'simple-statistics-extra', 'pure'],
  ['shared/src/fatigue/rainflow/x.ts', '../../contracts/life.js', 'shared/units only'],
  ['shared/src/fatigue/x.ts', '../rig/positions.js', 'shared/units only'],
  ['shared/src/rig/x.ts', '../contracts/rig.js', 'shared/units and shared/fatigue'],
  ['shared/src/rig/x.ts', 'node:path', 'pure'],
  ['shared/src/wind/x.ts', 'node:fs', 'pure'],
  ['shared/src/fatigue/x.ts', '../wind/beaufort.js', 'shared/units only'],
  ['shared/src/rerig-schedule/x.ts', '../contracts/rerig-schedules.js', 'shared/units and shared/fatigue'],
  ['shared/src/permissions/x.ts', 'zod', 'plain data'],
  ['shared/src/contracts/x.ts', '../fatigue/curves/curve.js', 'over the wire'],
  ['shared/src/contracts/x.ts', '@nestjs/common', 'A contract is Zod'],
  ['shared/src/queues/x.ts', 'bull', 'backend/src/queue'],
  ['reference-data/x.spec.ts'.replace('.spec', ''), '@stayledger/backend/persistence', 'plain data'],
  ['backend/src/vessels/x.ts', '@stayledger/jobs/load-logs/count-load-log', 'shared/queues'],
  ['backend/src/vessels/x.ts', '@stayledger/frontend', 'does not know'],
  ['backend/src/vessels/x.ts', '../../../shared/src/units/force.js', 'by its name'],
  ['backend/src/common/errors/x.ts', '../../vessels/vessels.service.js', 'no feature'],
  ['jobs/src/load-logs/x.ts', '@stayledger/backend/vessels/vessels.controller', 'controller or service'],
  ['jobs/src/load-logs/x.ts', '@stayledger/backend/app', 'controller or service'],
  ['jobs/src/load-logs/x.ts', '@stayledger/frontend/src/lib/clock', 'do not know'],
  ['jobs/src/all-in-one.ts', '@stayledger/backend/vessels/vessels.service', 'joins'],
  ['frontend/src/theme/x.ts', '../components/part-mark/part-mark', 'below everything'],
  ['frontend/src/lib/x.ts', '../features/vessels/vessels.queries', 'lib is below'],
  ['frontend/src/components/forms/x.tsx', '../../features/vessels/vessel-form', 'knows no feature'],
  ['frontend/src/components/forms/x.tsx', '@stayledger/backend/persistence', 'over HTTP'],
  ['frontend/src/components/forms/x.tsx', 'node:fs', 'over HTTP'],
  ['frontend/src/features/vessels/x.tsx', '../../pages/vessels/vessel-list.page', 'not the other way'],
  ['frontend/src/features/vessels/x.tsx', '../../app/router', 'not its shell'],
  ['frontend/src/features/vessels/x.tsx', '../parts/part-form', 'Another feature'],
  ['frontend/src/features/vessels/deep/x.tsx', '../../parts/part-form', 'Another feature'],
  ['frontend/src/features/vessels/x.tsx', '@stayledger/shared/queues/load-logs.queue', 'server side'],
  ['frontend/src/pages/vessels/x.tsx', '../../app/shell-layout', 'not its shell'],
  ['frontend/src/app/x.tsx', 'antd', 'first download'],
];

const ALLOWED_IMPORTS = [
  ['shared/src/units/length.ts', './force.js'],
  ['shared/src/fatigue/rainflow/x.ts', 'simple-statistics'],
  ['shared/src/fatigue/rainflow/x.ts', '../../units/force.js'],
  ['shared/src/fatigue/rainflow/x.ts', '../curves/curve.js'],
  ['shared/src/fatigue/rainflow/x.spec.ts', 'fast-check'],
  ['shared/src/rig/x.ts', '../fatigue/curves/curve.js'],
  ['shared/src/rerig-schedule/x.ts', '../fatigue/life/days.js'],
  ['shared/src/contracts/x.ts', 'zod'],
  ['shared/src/contracts/x.ts', '../permissions/permissions.js'],
  ['shared/src/queues/x.ts', '../contracts/values.js'],
  ['backend/src/database/x.ts', '../jobs/job.entity.js'],
  ['backend/src/vessels/x.ts', '@stayledger/shared/fatigue/life/days'],
  ['backend/src/vessels/x.ts', '../common/clock/clock.js'],
  ['backend/src/common/idempotency/x.ts', '../../users/user.entity.js'],
  ['jobs/src/load-logs/x.ts', '@stayledger/backend/persistence'],
  ['jobs/src/load-logs/x.ts', '@stayledger/backend/load-logs/load-log.entity'],
  ['jobs/src/load-logs/x.ts', '@stayledger/backend/queue/queue-clients'],
  ['jobs/src/load-logs/x.ts', '@stayledger/backend/config/env'],
  ['jobs/src/all-in-one.ts', '@stayledger/backend/app'],
  ['jobs/src/all-in-one.ts', './load-logs/load-logs.module.js'],
  ['frontend/src/features/vessels/x.tsx', '../parts/parts.queries'],
  ['frontend/src/features/vessels/x.tsx', '../../app/paths'],
  ['frontend/src/features/vessels/x.tsx', '../../components/forms/plain-fields'],
  ['frontend/src/features/vessels/deep/x.tsx', '../vessel-form'],
  ['frontend/src/features/vessels/x.tsx', '@stayledger/shared/contracts/vessels'],
  ['frontend/src/pages/vessels/x.tsx', '../../features/vessels/vessel-form'],
  ['frontend/src/app/x.tsx', 'antd/es/button'],
  ['frontend/e2e/x.e2e.ts', 'node:fs'],
];

describe('import arrows', () => {
  it.each(FORBIDDEN_IMPORTS)('%s may not import %s', async (file, imported, words) => {
    const found = await complaints(file, `import * as thing from '${imported}';\nexport { thing };\n`);
    expect(found).toEqual([expect.stringMatching(/^no-restricted-imports/)]);
    expect(found[0]).toContain(words);
  });

  it.each(ALLOWED_IMPORTS)('%s may import %s', async (file, imported) => {
    expect(await complaints(file, `import * as thing from '${imported}';\nexport { thing };\n`)).toEqual([]);
  });

  it('let no folder of shared or of the front end without a rule', async () => {
    const folders = ['shared/src', 'frontend/src'].flatMap((parent) =>
      fs
        .readdirSync(path.join(ROOT, parent), { withFileTypes: true })
        .filter((entry) => entry.isDirectory() && entry.name !== 'testing')
        .map(({ name }) => `${parent}/${name}`),
    );
    expect(folders.length).toBeGreaterThan(10);
    for (const folder of folders) {
      // Features are ruled by feature, one folder further down.
      const file = `${folder}/${folder.endsWith('/features') ? 'vessels/' : ''}x.ts`;
      expect(await complaints(file, "export * from 'node:fs';\n"), file).toHaveLength(1);
    }
  });
});

/** [where, code, words of the message or null when it is fine there] */
const USAGE = [
  ['shared/src/fatigue/x.ts', 'export const t = Date.now();', 'Clock'],
  ['backend/src/vessels/x.ts', 'export const t = new Date();', 'Clock'],
  ['frontend/src/pages/vessels/x.tsx', 'export const t = Date();', 'Clock'],
  ['backend/src/vessels/x.ts', 'export const t = (day: string) => new Date(day);', null],
  ['backend/src/common/clock/clock.ts', 'export const t = new Date();', null],
  ['frontend/src/lib/clock.ts', 'export const t = new Date();', null],
  ['shared/src/fatigue/x.ts', 'export const r = Math.random();', 'random generator'],
  ['backend/src/config/env.ts', 'export const r = Math.random();', 'random generator'],
  ['shared/src/fatigue/x.ts', 'export const r = Math.max(1, 2);', null],
  ['backend/src/vessels/x.ts', 'export const p = process.env.PORT;', 'config/env.ts'],
  ['jobs/src/main.ts', 'export const p = process.env.PORT;', 'config/env.ts'],
  ['backend/src/config/env.ts', 'export const p = process.env.PORT;', null],
  ['backend/src/vessels/x.spec.ts', 'export const p = process.env.PORT ?? Date.now();', null],
  ['frontend/src/pages/vessels/x.tsx', "export const c = '#1f5366';", 'theme'],
  ['frontend/src/components/charts/x.tsx', 'export const c = `1px solid #fff`;', 'theme'],
  ['frontend/src/components/charts/x.tsx', "export const c = '#a8431f80';", 'theme'],
  ['frontend/src/theme/tokens.ts', "export const c = '#1f5366';", null],
  ['frontend/src/pages/vessels/x.tsx', "export const c = ['#main', '#facets', 'log #12 of 3'];", null],
  ['backend/src/vessels/x.spec.ts', "it.only('x', () => {});", 'left out'],
  ['shared/src/fatigue/x.spec.ts', "describe.skip('x', () => {});", 'left out'],
  ['frontend/src/lib/x.spec.tsx', "xit('x', () => {});", 'left out'],
  ['frontend/e2e/x.e2e.ts', "test.skip('x', () => {});", 'left out'],
  ['backend/src/vessels/x.spec.ts', "it.each([1])('x', () => {});", null],
  ['backend/src/vessels/x.spec.ts', 'export const part = fit({ wire: 8 });', null],
  ['backend/src/vessels/x.spec.ts', 'fit(`x`, () => {});', 'left out'],
];

describe('what may be used where', () => {
  it.each(USAGE)('%s: %s', async (file, code, words) => {
    const found = await complaints(file, `${code}\n`);
    if (words === null) {
      expect(found).toEqual([]);
    } else {
      expect(found).toEqual([expect.stringMatching(/^no-restricted-syntax/)]);
      expect(found[0]).toContain(words);
    }
  });
});

describe('promises that nobody waits for', () => {
  it.each(['backend/src/vessels/x.ts', 'jobs/src/load-logs/x.int.spec.ts'])(
    'are an error in %s',
    async (file) => {
      const { rules } = await new ESLint({ cwd: ROOT }).calculateConfigForFile(path.join(ROOT, file));
      for (const name of typedRules) expect(rules[`@typescript-eslint/${name}`]?.[0]).toBe(2);
    },
  );
});
