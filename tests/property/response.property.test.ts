/** What every response must obey, for shapes, Biot and Fourier numbers at random; the seed is fixed. */
import { fc, test } from "@fast-check/vitest";
import { describe, expect } from "vitest";
import { oneTermResponse, productResponse, seriesResponse } from "../../src/analytic/response.ts";

const SEED = 20240611;
const geometry = fc.constantFrom("slab", "cylinder", "sphere");
/** evenly over the powers of ten */
const power = (low: number, high: number) =>
  fc.double({ min: low, max: high, noNaN: true }).map((exponent) => 10 ** exponent);
const biot = fc.oneof(
  { weight: 9, arbitrary: power(-3, 3) },
  { weight: 1, arbitrary: fc.constant(Infinity) },
);
const share = fc.double({ min: 0, max: 1, noNaN: true });

describe(`responses, seed ${SEED}`, () => {
  test.prop([geometry, biot, power(-7, 1.5), share], { seed: SEED, numRuns: 400 })(
    "theta lies within 0 and 1",
    (shape, bi, fourier, xi) => {
      const { theta, errorBound } = seriesResponse(shape, bi, fourier, xi);
      expect(theta).toBeGreaterThanOrEqual(-errorBound - 1e-12);
      expect(theta).toBeLessThanOrEqual(1 + errorBound + 1e-12);
    },
  );

  test.prop([geometry, biot, power(-7, 1.5), fc.oneof(share, fc.constant("mean" as const)), power(-3, 1)], {
    seed: SEED,
    numRuns: 400,
  })("theta falls with time", (shape, bi, fourier, place, step) => {
    const [now, later] = [fourier, fourier * (1 + step)].map((fo) => seriesResponse(shape, bi, fo, place));
    expect(later!.theta).toBeLessThanOrEqual(now!.theta + now!.errorBound + later!.errorBound + 1e-12);
  });

  test.prop([geometry, biot, power(-5, 1), share, share], { seed: SEED, numRuns: 300 })(
    "theta falls from the core to the surface",
    (shape, bi, fourier, a, b) => {
      const [inner, outer] = [Math.min(a, b), Math.max(a, b)].map((xi) =>
        seriesResponse(shape, bi, fourier, xi),
      );
      expect(outer!.theta).toBeLessThanOrEqual(inner!.theta + inner!.errorBound + outer!.errorBound + 1e-12);
    },
  );

  test.prop([geometry, power(-3, 2), power(-3, 1), power(0.01, 1)], { seed: SEED, numRuns: 300 })(
    "theta falls with the film",
    (shape, bi, fourier, factor) => {
      const [weak, strong] = [bi, bi * factor].map((value) => seriesResponse(shape, value, fourier, "mean"));
      expect(strong!.theta).toBeLessThanOrEqual(weak!.theta + 1e-12);
    },
  );

  test.prop([geometry, biot, power(-4, 0.7)], { seed: SEED, numRuns: 120 })(
    "the mean is the integral over the body",
    (shape, bi, fourier) => {
      const dimension = { slab: 1, cylinder: 2, sphere: 3 }[shape];
      // substitution xi = 1 - s^2 puts points where the skin layer is; Simpson's rule
      const panels = 400;
      const at = (s: number) => {
        const xi = 1 - s * s;
        return seriesResponse(shape, bi, fourier, xi).theta * dimension * xi ** (dimension - 1) * 2 * s;
      };
      let integral = at(0) + at(1);
      for (let i = 1; i < panels; i++) integral += (i % 2 === 1 ? 4 : 2) * at(i / panels);
      integral /= 3 * panels;
      expect(Math.abs(integral - seriesResponse(shape, bi, fourier, "mean").theta)).toBeLessThan(1e-6);
    },
  );

  test.prop([geometry, power(-3, 3), power(-2, 0.5)], { seed: SEED, numRuns: 150 })(
    "what the mean loses has passed the surface: d mean / d Fo = -d Bi theta(surface)",
    (shape, bi, fourier) => {
      const dimension = { slab: 1, cylinder: 2, sphere: 3 }[shape];
      const step = fourier * 1e-4;
      const [before, after] = [fourier - step, fourier + step].map(
        (fo) => seriesResponse(shape, bi, fo, "mean").theta,
      );
      const slope = (after! - before!) / (2 * step);
      const flux = -dimension * bi * seriesResponse(shape, bi, fourier, 1).theta;
      expect(Math.abs(slope - flux)).toBeLessThan(1e-5 * (1 + Math.abs(flux)));
    },
  );

  test.prop([geometry, biot, power(0.4, 1.3), share], { seed: SEED, numRuns: 200 })(
    "late on, one term is the whole series",
    (shape, bi, fourier, xi) => {
      const exact = seriesResponse(shape, bi, fourier, xi).theta;
      expect(Math.abs(oneTermResponse(shape, bi, fourier, xi) - exact)).toBeLessThan(1e-8);
    },
  );

  test.prop([biot, biot, power(-5, 1), power(-5, 1), share, share], { seed: SEED, numRuns: 200 })(
    "a finite cylinder is never behind the long one or the slab it is cut from",
    (wall, end, acrossFourier, alongFourier, xi, eta) => {
      const across = { geometry: "cylinder", biot: wall, fourier: acrossFourier, position: xi } as const;
      const along = { geometry: "slab", biot: end, fourier: alongFourier, position: eta } as const;
      const { theta, errorBound } = productResponse([across, along]);
      const single = [across, along].map((f) => seriesResponse(f.geometry, f.biot, f.fourier, f.position));
      for (const one of single)
        expect(theta).toBeLessThanOrEqual(one.theta + one.errorBound + errorBound + 1e-12);
    },
  );
});
