import { describe, expect, it } from 'vitest';
import { groupParts } from './group-parts.js';
import type { PlanPart } from './group-parts.js';

function part(id: string, change: Partial<PlanPart> = {}): PlanPart {
  return {
    id,
    name: id,
    groupName: 'cap shrouds',
    standing: 'dated',
    replaceByOn: '2030-05-01',
    confirmByOn: null,
    replacement: {
      againAfterDays: 3652,
      terms: { aloft: { costMinor: 40_000, hours: 6 }, 'mast-out-afloat': { costMinor: 35_000, hours: 4 } },
      leadDays: 42,
    },
    inspection: null,
    ...change,
  };
}
const noRules = { together: [], takesAlong: [] };

describe('parts as tasks', () => {
  it('puts identical parts together and adds up what they take', () => {
    const { tasks, problems } = groupParts([part('port'), part('starboard')], noRules);
    expect(problems).toEqual([]);
    expect(tasks).toHaveLength(1);
    expect(tasks[0]).toMatchObject({
      name: 'cap shrouds',
      partIds: ['port', 'starboard'],
      dueOn: '2030-05-01',
      terms: { aloft: { costMinor: 80_000, hours: 12 }, 'mast-out-afloat': { costMinor: 70_000, hours: 8 } },
    });
  });

  it('leaves parts of different dates apart unless a rule binds them', () => {
    const parts = [part('port'), part('starboard', { replaceByOn: '2029-05-01' })];
    expect(groupParts(parts, noRules).tasks).toHaveLength(2);
    const bound = groupParts(parts, { ...noRules, together: [['port', 'starboard']] }).tasks;
    expect(bound.map(({ dueOn, partIds }) => [dueOn, partIds])).toEqual([
      ['2029-05-01', ['port', 'starboard']],
    ]);
  });

  it('binds through a third part, with the shortest life, longest lead time and common kinds', () => {
    const rod = part('rod', {
      replacement: {
        againAfterDays: 3000,
        terms: { 'mast-out-afloat': { costMinor: 1, hours: 1 } },
        leadDays: 84,
      },
    });
    const [task] = groupParts([part('a'), part('b'), rod], {
      ...noRules,
      together: [
        ['a', 'rod'],
        ['rod', 'b'],
      ],
    }).tasks;
    expect(task).toMatchObject({ againAfterDays: 3000, leadDays: 84 });
    expect(task.terms).toEqual({ 'mast-out-afloat': { costMinor: 70_001, hours: 9 } });
  });

  it('plans provisional and suspended parts as inspections', () => {
    const look = { againAfterDays: 730, terms: { aloft: { costMinor: 9_000, hours: 2 } }, leadDays: 0 };
    const { tasks, problems } = groupParts(
      [
        part('port', {
          standing: 'provisional',
          confirmByOn: '2028-04-01',
          inspection: { ...look, dueOn: '2029-01-01' },
        }),
        part('starboard', { standing: 'suspended', confirmByOn: '2028-04-01' }),
      ],
      noRules,
    );
    expect(tasks.map(({ action, ground, dueOn }) => [action, ground, dueOn])).toEqual([
      ['inspect', 'provisional-date', '2028-04-01'],
    ]);
    expect(problems).toEqual([expect.stringContaining('starboard: its date is suspended')]);
  });

  it('lets a new part count as an inspected one, and wire take its terminals along', () => {
    const look = { againAfterDays: 730, terms: { aloft: { costMinor: 9_000, hours: 2 } }, leadDays: 0 };
    const parts = [
      part('wire', { inspection: { ...look, dueOn: '2029-01-01' } }),
      part('terminal', { groupName: 'terminals', replaceByOn: '2034-01-01' }),
    ];
    const { tasks } = groupParts(parts, {
      ...noRules,
      takesAlong: [{ partId: 'wire', alongIds: ['terminal'] }],
    });
    const byId = Object.fromEntries(tasks.map((task) => [task.id, task]));
    expect(byId['inspect:wire'].alsoDoneBy).toEqual(['replace:wire']);
    expect(byId['replace:wire'].needs).toEqual(['replace:terminal']);
    expect(byId['replace:terminal'].needs).toEqual([]);
  });

  it('says so where no kind of visit allows what has to be done together', () => {
    const aloftOnly = part('a', {
      replacement: { againAfterDays: null, terms: { aloft: { costMinor: 1, hours: 1 } }, leadDays: 0 },
    });
    const outOnly = part('b', {
      replacement: {
        againAfterDays: null,
        terms: { 'mast-out-afloat': { costMinor: 1, hours: 1 } },
        leadDays: 0,
      },
    });
    const { problems } = groupParts([aloftOnly, outOnly], { ...noRules, together: [['a', 'b']] });
    expect(problems).toEqual([expect.stringContaining('no kind of visit allows all')]);
  });
});
