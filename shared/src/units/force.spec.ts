import { describe, expect, it } from 'vitest';
import { FORCE_UNITS, isForceUnit, KN_PER, toKn } from './force.js';

describe('force units', () => {
  // LM-01, SI and the international pound, exact by definition: 0.45359237 kg * 9.80665 m/s² = 4.4482216152605 N.
  it('hold the exact factors', () => {
    expect(KN_PER.lbf * 1000).toBeCloseTo(4.4482216152605, 13);
    expect(KN_PER.tf * 1000).toBe(9806.65);
    expect(KN_PER.kgf * 1000).toBeCloseTo(9.80665, 14);
    expect(KN_PER.daN * 1000).toBe(10);
  });

  // LM-01: short and long ton-force are 2000 and 2240 lbf.
  it('make a short and a long ton-force of pounds', () => {
    expect(toKn(2000, 'lbf') * 1000).toBeCloseTo(8896.443230521, 9);
    expect(toKn(2240, 'lbf') * 1000).toBeCloseTo(9964.01641818352, 9);
  });

  it('give the double nearest to the decimal for newtons and decanewtons', () => {
    expect(toKn(12345, 'N')).toBe(12.345);
    expect(toKn(1234.5, 'daN')).toBe(12.345);
    expect(toKn(-0.1, 'N')).toBe(-0.0001);
  });

  it('take only exact spellings', () => {
    for (const unit of FORCE_UNITS) expect(isForceUnit(unit)).toBe(true);
    for (const text of ['kn', 't', 'T', 'ton', 'constructor', '']) expect(isForceUnit(text)).toBe(false);
  });
});
