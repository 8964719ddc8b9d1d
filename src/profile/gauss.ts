/** Gauss-Legendre points for the interval 0..1. */
export interface GaussPoint {
  readonly at: number;
  readonly weight: number;
}

/** Roots of the Legendre polynomial by Newton's method from the cosine guess; exact for degree 2 count - 1. */
export function gaussPoints(count: number): GaussPoint[] {
  return Array.from({ length: count }, (_, i) => {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    let slope = 1;
    for (let turn = 0; turn < 20; turn++) {
      let [before, here] = [1, x];
      for (let n = 2; n <= count; n++)
        [before, here] = [here, ((2 * n - 1) * x * here - (n - 1) * before) / n];
      slope = (count * (x * here - before)) / (x * x - 1);
      const step = here / slope;
      x -= step;
      if (Math.abs(step) < 1e-16) break;
    }
    return { at: (1 + x) / 2, weight: 1 / ((1 - x * x) * slope * slope) };
  });
}
