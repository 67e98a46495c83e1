import type { WorkingStepDto } from '@stayledger/shared/contracts/life';
import { describe, expect, it } from 'vitest';
import { evaluateStep, toExpression } from './evaluate-step';

function step(equation: string, inputs: Record<string, number>, value: number | null): WorkingStepDto {
  return {
    title: 't',
    equation,
    inputs: Object.entries(inputs).map(([symbol, amount]) => ({
      symbol,
      meaning: '',
      value: amount,
      unit: '',
      from: '',
    })),
    result: { symbol: 'x', value, unit: '' },
    source: '',
  };
}

describe('evaluateStep', () => {
  it('works a printed equation out from its printed inputs', async () => {
    // By hand: 10^12.5 / 50^3 = 3.16227766e12 / 125000 = 25298221.28.
    const check = await evaluateStep(step('N = 10^a · S^(−m)', { a: 12.5, S: 50, m: 3 }, 25_298_221.281347));
    expect(check).toMatchObject({ kind: 'computed', agrees: true });
  });

  it('knows names with indices and Greek letters', async () => {
    const check = await evaluateStep(step('Δσ = 1000 × ΔF ÷ A_m', { ΔF: 5, A_m: 20 }, 250));
    expect(check).toEqual({ kind: 'computed', value: 250, agrees: true });
  });

  it('says so when the result beside it is another', async () => {
    const check = await evaluateStep(step('D = n / N', { n: 3, N: 4 }, 0.76));
    expect(check).toEqual({ kind: 'computed', value: 0.75, agrees: false });
  });

  it.each([
    ['a sum over many lines', 'D = Σ n_i / N_i'],
    ['a symbol without a value', 'D = n / unknown_thing'],
    ['a sentence', 'the earlier of the two days'],
  ])('does not pretend for %s', async (_, equation) => {
    expect((await evaluateStep(step(equation, { n: 1 }, 1))).kind).toBe('not-computable');
  });

  it('has nothing to compare without a result', async () => {
    expect((await evaluateStep(step('D = n / N', { n: 1, N: 2 }, null))).kind).toBe('not-computable');
  });
});

describe('toExpression', () => {
  it('turns typographic signs into the parser’s', () => {
    expect(toExpression('a − b·c ÷ d²')).toBe('a - b*c / d^2');
  });
});
