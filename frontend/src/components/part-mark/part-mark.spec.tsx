import { screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { renderWithin } from '../../testing/render-app';
import { sampleStanding } from '../../testing/samples';
import { PartMark } from './part-mark';

type Props = Partial<React.ComponentProps<typeof PartMark>>;

function mark(standing: Parameters<typeof sampleStanding>[0], props: Props = {}) {
  renderWithin(<PartMark standing={sampleStanding(standing)} kindOfWire="strand" {...props} />);
  return screen.getByRole('img');
}

describe('PartMark', () => {
  it.each<[string, Parameters<typeof sampleStanding>[0], Props, RegExp]>([
    ['an assessed part', {}, {}, /^In date, 67.% of its allowance used$/],
    ['a due part', { due: 'due' }, {}, /^Due, 67.% of its allowance used$/],
    [
      'an overdue part beyond its allowance',
      { due: 'overdue', allowanceUsed: 1.4 },
      {},
      /^Overdue, 1\.4 times its allowance$/,
    ],
    [
      'a part not assessed',
      { assessment: 'not-assessed', allowanceUsed: null, due: 'in-date' },
      {},
      /^Not assessed$/,
    ],
    [
      'a part on the calendar that is due',
      { assessment: 'calendar-only', allowanceUsed: null, due: 'due' },
      { kindOfWire: 'fibre' },
      /^Due, calendar only$/,
    ],
    ['a provisional part', {}, { provisional: true }, /^Provisional, 67.% of its allowance used$/],
    ['a failed part', {}, { failed: true }, /^Failed inspection, /],
    ['a suspended part', { due: 'overdue' }, { suspended: true }, /^Suspended$/],
  ])('says in words what it draws for %s', (_name, standing, props, words) => {
    expect(mark(standing, props).getAttribute('aria-label')).toMatch(words);
  });

  it('flies the flag for due and overdue parts only', () => {
    expect(mark({ due: 'overdue' }).querySelector('[class*=flag]')).not.toBeNull();
    document.body.innerHTML = '';
    expect(mark({ due: 'in-date' }).querySelector('[class*=flag]')).toBeNull();
  });

  it('takes down the flag and the ink of a suspended part: no date, no number', () => {
    const drawn = mark({ due: 'overdue' }, { suspended: true, size: 48 });
    expect(drawn.querySelector('[class*=flag]')).toBeNull();
    expect(drawn.querySelector('[class*=ink]')).toBeNull();
  });

  it('dashes the rim of a part not assessed and dots the rim of a provisional one', () => {
    const dashed = mark({ assessment: 'not-assessed', allowanceUsed: null }).querySelector('[class*=rim]');
    expect(dashed?.getAttribute('stroke-dasharray')).toBe('3 2');
    document.body.innerHTML = '';
    const dotted = mark({}, { provisional: true }).querySelector('[class*=rim]');
    expect(dotted?.getAttribute('stroke-dasharray')).toBe('0.1 2.6');
  });

  it('gives owners other words in place of its own', () => {
    expect(mark({}, { alternative: 'In date, about two thirds used' })).toHaveProperty(
      'ariaLabel',
      'In date, about two thirds used',
    );
  });
});
