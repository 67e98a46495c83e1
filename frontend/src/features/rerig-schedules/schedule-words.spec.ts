import { preferencesSchema } from '@stayledger/shared/contracts/auth';
import { describe, expect, it } from 'vitest';
import { createFormatter } from '../../lib/formatting/format';
import { money } from './schedule-words';

describe('an amount of money', () => {
  const format = createFormatter(preferencesSchema.parse({}));

  it('counts a hundred minor units to one, and one where the currency has no smaller coin', () => {
    expect(money(1_234_500, 'EUR', format)).toBe('EUR\u00a012\u202f345');
    expect(money(4_200, 'JPY', format)).toBe('JPY\u00a04200');
    expect(money(-50_000, 'NOK', format)).toBe('NOK\u00a0\u2212500');
  });
});
