import type { MixedIntegerProgram } from './mixed-integer-program.js';

/** Collects columns and rows one by one; {@link ProgramBuilder.build} packs them. */
export class ProgramBuilder {
  readonly #costs: number[] = [];
  readonly #lowers: number[] = [];
  readonly #uppers: number[] = [];
  readonly #whole: number[] = [];
  readonly #rowLowers: number[] = [];
  readonly #rowUppers: number[] = [];
  readonly #rowStarts: number[] = [0];
  readonly #columnIndices: number[] = [];
  readonly #coefficients: number[] = [];

  get columnCount(): number {
    return this.#costs.length;
  }

  /** Adds a yes-or-no column and returns its number. */
  addChoice(cost: number): number {
    return this.#addColumn(cost, 0, 1, 1);
  }

  /** Adds a column of any value from lower to upper and returns its number. */
  addAmount(cost: number, lower: number, upper: number): number {
    return this.#addColumn(cost, lower, upper, 0);
  }

  /** Fixes a column. */
  fix(column: number, value: number): void {
    this.#lowers[column] = value;
    this.#uppers[column] = value;
  }

  /**
   * Adds the row lower <= sum of coefficient x column <= upper and returns its number.
   *
   * @param entries columns (each at most once) with their coefficients
   */
  addRow(
    lower: number,
    upper: number,
    entries: readonly (readonly [column: number, coefficient: number])[],
  ): number {
    for (const [column, coefficient] of entries) {
      this.#columnIndices.push(column);
      this.#coefficients.push(coefficient);
    }
    this.#rowStarts.push(this.#columnIndices.length);
    this.#rowLowers.push(lower);
    this.#rowUppers.push(upper);
    return this.#rowLowers.length - 1;
  }

  /** The packed program. */
  build(): MixedIntegerProgram {
    return {
      costs: Float64Array.from(this.#costs),
      lowers: Float64Array.from(this.#lowers),
      uppers: Float64Array.from(this.#uppers),
      whole: Uint8Array.from(this.#whole),
      rowLowers: Float64Array.from(this.#rowLowers),
      rowUppers: Float64Array.from(this.#rowUppers),
      rowStarts: Int32Array.from(this.#rowStarts),
      columnIndices: Int32Array.from(this.#columnIndices),
      coefficients: Float64Array.from(this.#coefficients),
    };
  }

  #addColumn(cost: number, lower: number, upper: number, whole: number): number {
    this.#costs.push(cost);
    this.#lowers.push(lower);
    this.#uppers.push(upper);
    this.#whole.push(whole);
    return this.#costs.length - 1;
  }
}
