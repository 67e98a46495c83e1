/** A number of cycles of one range about one mean, in load units. */
export interface CycleCount {
  range: number;
  mean: number;
  /** Whole and half cycles: 1 for a closed one, 0.5 for a pair of the residue. */
  count: number;
}
