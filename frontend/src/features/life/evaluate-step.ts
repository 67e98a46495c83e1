import type { WorkingStepDto } from '@stayledger/shared/contracts/life';

/** What became of an equation worked out again in the browser. */
export type StepCheck =
  { kind: 'computed'; value: number; agrees: boolean } | { kind: 'not-computable'; reason: string };

/** The server's doubles and these go through different orders of operations; beyond this they differ for a reason. */
const RELATIVE_TOLERANCE = 1e-6;

/** Typographic signs of the shown equation, as the parser wants them. */
export function toExpression(equation: string): string {
  return equation
    .replaceAll('−', '-')
    .replaceAll('–', '-')
    .replaceAll(/[·×]/g, '*')
    .replaceAll('÷', '/')
    .replaceAll('²', '^2')
    .replaceAll('³', '^3')
    .replaceAll('√', 'sqrt ')
    .replaceAll('π', 'pi');
}

/**
 * Evaluates the shown equation with the shown inputs by an independent library, so that a reader sees that the
 * figures on the page belong together. Loaded only when somebody asks: the library is large.
 */
export async function evaluateStep(step: WorkingStepDto): Promise<StepCheck> {
  if (step.result.value === null)
    return { kind: 'not-computable', reason: 'There is no result to compare with.' };
  const math = await import('mathjs/number');
  const { evaluate } = math.create({
    evaluate: math.evaluateDependencies,
    add: math.addDependencies,
    subtract: math.subtractDependencies,
    multiply: math.multiplyDependencies,
    divide: math.divideDependencies,
    unaryMinus: math.unaryMinusDependencies,
    pow: math.powDependencies,
    sqrt: math.sqrtDependencies,
    log10: math.log10Dependencies,
    log: math.logDependencies,
    max: math.maxDependencies,
    min: math.minDependencies,
  });
  // A Map keeps the shown symbols apart from the library's own names, and nothing else is in scope.
  const scope = new Map<string, unknown>(step.inputs.map(({ symbol, value }) => [symbol, value]));
  const equation = toExpression(step.equation);
  const rightSide = equation.slice(equation.indexOf('=') + 1);
  let value: unknown;
  try {
    value = evaluate(rightSide, scope);
  } catch {
    return {
      kind: 'not-computable',
      reason: 'This equation stands for many lines and is not worked out here.',
    };
  }
  if (typeof value !== 'number' || Number.isNaN(value)) {
    return {
      kind: 'not-computable',
      reason: 'This equation stands for many lines and is not worked out here.',
    };
  }
  const wanted = step.result.value;
  const scale = Math.max(Math.abs(value), Math.abs(wanted));
  return {
    kind: 'computed',
    value,
    agrees: value === wanted || Math.abs(value - wanted) <= RELATIVE_TOLERANCE * scale,
  };
}
