import { BigIntType, Property } from '@mikro-orm/core';

/** A count that may pass two thousand million: `bigint`, a plain number in memory (exact up to 2^53). */
export function BigCountColumn(options: { nullable?: boolean; default?: number } = {}) {
  return Property<object>({ type: new BigIntType('number'), columnType: 'bigint', ...options });
}
