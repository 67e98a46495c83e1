/**
 * Sum of doubles with Neumaier's compensation: the rounding error of every step is carried along and added at the
 * end, so that millions of tiny damages beside a few large ones lose nothing that matters.
 * Source: Neumaier, Z. Angew. Math. Mech. 54 (1974), 39-51 (from memory).
 */
export class CompensatedSum {
  private sum = 0;
  private carry = 0;

  /** Adds one number. */
  add(value: number): void {
    const total = this.sum + value;
    this.carry += Math.abs(this.sum) >= Math.abs(value) ? this.sum - total + value : value - total + this.sum;
    this.sum = total;
  }

  /** The sum so far. An infinite term makes it infinite (the carry of an infinity would be NaN). */
  get value(): number {
    return Number.isFinite(this.sum) ? this.sum + this.carry : this.sum;
  }
}
