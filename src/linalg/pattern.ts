/** Placeholder for the first type-check; the pattern grows here. */
export interface SparsityPattern {
  /** number of unknowns */
  readonly size: number;
  /** start of each row in `columns`, size + 1 values */
  readonly rowStart: Int32Array;
  /** column numbers, ascending in each row, diagonal and both triangles included */
  readonly columns: Int32Array;
  /** place of each diagonal entry in `columns` */
  readonly diagonal: Int32Array;
}
