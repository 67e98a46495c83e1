import { describe, expect, it } from 'vitest';
import { NO_DECISIONS } from './plan-input.js';
import { vesselPlanInput } from './vessel-plan-input.js';
import type { PlanBasis, RegisterPart } from './vessel-plan-input.js';
import { yardSeasons } from './yard-seasons.js';
import { STARTING_YARD_TERMS } from './yard-terms.js';

const shroud: RegisterPart = {
  partId: 'port',
  kind: 'cap-shroud',
  side: 'port',
  mast: 'main',
  label: 'Cap shroud, port',
  kindOfWire: 'strand',
  diameterMm: 8,
  lengthM: 15,
  fittedOn: '2019-05-01',
  replaceByOn: '2029-05-01',
};
const basis: PlanBasis = {
  asOfOn: '2027-04-01',
  horizonYears: 3,
  currency: 'EUR',
  terms: STARTING_YARD_TERMS,
  parts: [shroud],
  absences: [],
  fullSeasonIds: [],
  decisions: NO_DECISIONS,
};

describe('seasons of a yard', () => {
  const winter = { id: 'winter', name: 'Winter', fromDay: '11-15', untilDay: '02-29', berths: 1, hours: 1 };

  it('end in the year after where they run over New Year, and on the last day February has', () => {
    const seasons = yardSeasons([winter], '2027-03-01', '2030-01-01');
    expect(seasons.map(({ label, fromOn, untilOn }) => [label, fromOn, untilOn])).toEqual([
      ['Winter 2027/28', '2027-11-15', '2028-02-29'],
      ['Winter 2028/29', '2028-11-15', '2029-02-28'],
    ]);
  });

  it('that have begun count from today', () => {
    const [running] = yardSeasons([winter], '2028-01-10', '2029-01-01');
    expect([running.id, running.fromOn]).toEqual(['2027-winter', '2028-01-10']);
  });
});

describe('input of a plan', () => {
  // 24,000 for the part, and 160 x 15 m x 8 mm = 19,200 for its wire: 43,200 minor units. Aloft 4 h x 1.5 = 6 h.
  // From 1 May 2019 to 1 May 2029 are ten years with three leap days (2020, 2024, 2028): 3,653 days.
  it('prices a part by its size, and gives the next one the same life', () => {
    const [task] = vesselPlanInput(basis).input.tasks;
    expect(task).toMatchObject({
      name: 'Cap shroud, port',
      dueOn: '2029-05-01',
      againAfterDays: 3653,
      terms: { aloft: { costMinor: 43_200, hours: 6 }, 'mast-out-afloat': { costMinor: 43_200, hours: 4 } },
    });
  });

  it('takes port and starboard together, at the earlier date', () => {
    const starboard: RegisterPart = {
      ...shroud,
      partId: 'starboard',
      side: 'starboard',
      label: 'Cap shroud, starboard',
      replaceByOn: '2028-10-01',
    };
    const tasks = vesselPlanInput({ ...basis, parts: [shroud, starboard] }).input.tasks;
    expect(tasks.map(({ name, dueOn }) => [name, dueOn])).toEqual([
      ['Cap shroud, both sides', '2028-10-01'],
      ['Inspection of the whole rig', '2029-04-01'],
    ]);
  });

  it('leaves running rigging out, and rod in visits with the mast out only', () => {
    const parts: RegisterPart[] = [
      { ...shroud, partId: 'halyard', kind: 'halyard', side: 'centre', label: 'Halyard' },
      { ...shroud, partId: 'rod', kindOfWire: 'rod' },
    ];
    const [task, inspection] = vesselPlanInput({ ...basis, parts }).input.tasks;
    expect(task.partIds).toEqual(['rod']);
    expect(Object.keys(task.terms)).toEqual(['mast-out-afloat', 'mast-out-ashore']);
    expect(inspection.partIds).toEqual(['rod']);
  });

  it('has no window where the yard is full, closed, or the vessel away, and says so', () => {
    const { input, notes, windowLabels } = vesselPlanInput({
      ...basis,
      fullSeasonIds: ['2027-autumn'],
      absences: [{ fromOn: '2028-02-01', untilOn: '2028-06-01' }],
      terms: {
        ...STARTING_YARD_TERMS,
        closures: [{ fromOn: '2028-10-01', untilOn: '2028-12-31', reason: 'the slip is rebuilt' }],
      },
    });
    expect(windowLabels.map(({ label }) => label)).toEqual(['Spring 2027', 'Spring 2029', 'Autumn 2029']);
    expect(input.windows[0]).toMatchObject({
      id: '2027-spring',
      opensOn: '2027-04-01',
      closesOn: '2027-05-15',
    });
    expect(notes).toEqual([
      'The yard has no room left in Autumn 2027.',
      'Closures and absences leave no window in Spring 2028, Autumn 2028.',
    ]);
  });

  it('says where a length was taken for granted, and forgets decisions about windows that are no more', () => {
    const { input, notes } = vesselPlanInput({
      ...basis,
      parts: [{ ...shroud, lengthM: null }],
      decisions: {
        ...NO_DECISIONS,
        locked: [
          { windowId: '2026-autumn', kind: 'aloft' },
          { windowId: '2028-spring', kind: 'aloft' },
        ],
      },
    });
    expect(notes[0]).toContain('One part has no length');
    expect(input.decisions.locked).toEqual([{ windowId: '2028-spring', kind: 'aloft' }]);
  });
});
