import { describe, expect, it } from 'vitest';
import { preferencesSchema } from '@stayledger/shared/contracts/auth';
import { createFormatter } from '../../lib/formatting/format';
import { sampleId, samplePosition, sampleStanding } from '../../testing/samples';
import { byUrgency, plainDue, plainMark, plainShare, plainWhy } from './plain-words';

const format = createFormatter(preferencesSchema.parse({}));
const position = (overrides: Parameters<typeof sampleStanding>[0], number = 30) => {
  const sample = samplePosition({ id: sampleId(number) });
  return { ...sample, part: sample.part && { ...sample.part, standing: sampleStanding(overrides) } };
};

describe('plainShare', () => {
  it.each([
    [0.02, 'hardly any'],
    [0.25, 'about a quarter'],
    [0.5, 'about half'],
    [2 / 3, 'about two thirds'],
    [0.95, 'nearly all'],
    [1, 'all'],
    [1.4, 'more than all'],
  ])('says %f as "%s"', (ratio, words) => {
    expect(plainShare(ratio)).toBe(words);
  });
});

describe('what owners read', () => {
  it('never holds a percentage or the words kept from owners', () => {
    for (const assessment of ['assessed', 'not-assessed', 'calendar-only'] as const) {
      for (const due of ['overdue', 'due', 'in-date'] as const) {
        for (const governingRule of ['fatigue', 'calendar'] as const) {
          const sample = position({ assessment, due, governingRule });
          const said = [
            plainDue(sample, format, '2026-12-01', 'Europe/Oslo'),
            plainWhy(sample.part?.standing ?? sampleStanding()),
            plainMark(sample.part?.standing ?? sampleStanding()),
          ].join(' ');
          expect(said).not.toMatch(/%|percent|median|damage|residue|\b(safe|ok|healthy|passed|certified)\b/i);
        }
      }
    }
  });

  it('names the day within a year and the season beyond it', () => {
    const near = position({ replaceByOn: '2027-05-03', due: 'due' });
    const far = position({ replaceByOn: '2029-04-02' });
    expect(plainDue(near, format, '2026-12-01', 'Europe/Oslo')).toBe(
      'Cap shroud, port: replace by 3\u00a0May\u00a02027.',
    );
    expect(plainDue(far, format, '2026-12-01', 'Europe/Oslo')).toBe(
      'Cap shroud, port: replace by spring\u00a02029.',
    );
  });

  it('gives no sentence where there is no date', () => {
    expect(plainDue(position({ replaceByOn: null, due: 'no-date' }), format, '2026-12-01', '')).toBeNull();
  });

  it('puts the earliest date first and parts without a date last', () => {
    const late = position({ replaceByOn: '2031-01-01' }, 31);
    const none = position({ replaceByOn: null }, 32);
    const early = position({ replaceByOn: '2026-05-01' }, 33);
    expect(byUrgency([late, none, early]).map(({ id }) => id)).toEqual([early.id, late.id, none.id]);
  });
});
