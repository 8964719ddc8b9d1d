// Exports of the module: one instance, one analysis. All offsets are into its memory.
export { allocateInts, allocateReals, mark, reset } from "./memory";
export {
  analyze,
  columns,
  diagonal,
  innerOf,
  outerOf,
  rowStart,
  size,
  source,
  supernodes,
  workX,
  workY,
} from "./analysis";
export { factorEntries, factorWork } from "./supernodes";
export { failedDiagonal, failedPivot, subtractProducts, factorPanel } from "./dense";
export {
  beginFactorization,
  continueFactorization,
  factorizationWork,
  failedUnknown,
  newFactor,
} from "./factor";
export { multiplyAdd, solve } from "./solve";
