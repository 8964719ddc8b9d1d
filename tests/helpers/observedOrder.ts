/** Observed order of convergence from errors on a ladder of sizes, each half the one before. */
export const observedOrders = (errors: readonly number[]): number[] =>
  errors.slice(1).map((error, i) => Math.log2(errors[i]! / error));
