import type { LogFindingDto } from '@stayledger/shared/contracts/load-logs';
import { describe, expect, it } from 'vitest';
import { orderFindings } from './order-findings';

function finding(code: string, overrides: Partial<LogFindingDto>): LogFindingDto {
  return {
    code,
    severity: 'info',
    column: null,
    fromAt: null,
    toAt: null,
    line: null,
    count: 1,
    message: 'm',
    action: 'a',
    ...overrides,
  };
}

describe('orderFindings', () => {
  it('puts severity first, then the longer stretch, then the larger number of places', () => {
    const hour = { fromAt: '2026-06-01T10:00:00.000Z', toAt: '2026-06-01T11:00:00.000Z' };
    const minute = { fromAt: '2026-06-01T10:00:00.000Z', toAt: '2026-06-01T10:01:00.000Z' };
    const given = [
      finding('many-cells', { severity: 'warning', count: 900 }),
      finding('one-cell', { severity: 'warning' }),
      finding('note', { severity: 'info', ...hour }),
      finding('short-gap', { severity: 'warning', ...minute }),
      finding('long-gap', { severity: 'warning', ...hour }),
      finding('implausible', { severity: 'serious' }),
    ];
    expect(orderFindings(given).map((item) => item.code)).toEqual([
      'implausible',
      'long-gap',
      'short-gap',
      'many-cells',
      'one-cell',
      'note',
    ]);
  });

  it('leaves the given list as it was', () => {
    const given = [finding('a', {}), finding('b', { severity: 'serious' })];
    orderFindings(given);
    expect(given.map((item) => item.code)).toEqual(['a', 'b']);
  });
});
