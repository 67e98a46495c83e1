import { describe, expect, it } from 'vitest';
import { logAxis } from './log-axis';

describe('logAxis', () => {
  it('ticks 1, 2 and 5 over a short stretch and ends on the ticks around it', () => {
    expect(logAxis([37, 400])).toEqual({ min: 20, max: 500, ticks: [20, 50, 100, 200, 500] });
  });

  it('ticks decades alone over more than three of them', () => {
    expect(logAxis([1.2e4, 8e8])).toEqual({ min: 1e4, max: 1e9, ticks: [1e4, 1e5, 1e6, 1e7, 1e8, 1e9] });
  });

  it('keeps values that lie on a tick as the ends', () => {
    expect(logAxis([1e4, 1e9])).toMatchObject({ min: 1e4, max: 1e9 });
  });

  it('spans at least one step round a single value', () => {
    const axis = logAxis([3]);
    expect(axis?.min).toBe(2);
    expect(axis?.max).toBe(5);
  });

  it('does not care about the order and passes over what has no logarithm', () => {
    expect(logAxis([400, 0, -3, Number.NaN, 37])).toEqual(logAxis([37, 400]));
    expect(logAxis([0, -1])).toBeNull();
  });
});
