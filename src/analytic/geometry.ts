/**
 * The three one-dimensional shapes: what their eigenfunctions are and where their eigenvalues lie.
 *
 * Position xi is x over the half thickness (slab, from the middle plane) or r over the radius. The eigenfunctions S
 * solve (w S')' + zeta^2 w S = 0 with weight w = xi^(d - 1), d = 1, 2, 3, S(0) = 1, S'(0) = 0 and, at xi = 1,
 * S' + Bi S = 0:
 *
 *   slab      S = cos(zeta xi)                  zeta tan zeta = Bi
 *   cylinder  S = J0(zeta xi)                   zeta J1(zeta) = Bi J0(zeta)
 *   sphere    S = sin(zeta xi) / (zeta xi)      1 - zeta cot zeta = Bi
 *
 * Source: H. S. Carslaw, J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. 1959, secs. 3.11, 7.7, 9.4.
 */
import besselJ0 from "@stdlib/math-base-special-besselj0";
import besselJ1 from "@stdlib/math-base-special-besselj1";

export type Geometry = "slab" | "cylinder" | "sphere";

export interface GeometryFunctions {
  /** 1, 2, 3: plane, round, ball */
  readonly dimension: number;
  /** S at zeta xi */
  readonly shape: (argument: number) => number;
  /** S' / zeta, negative, at xi = 1: sin, J1, ... */
  readonly steepness: (zeta: number) => number;
  /** volume mean of S */
  readonly mean: (zeta: number) => number;
  /** integral of w S^2 over 0..1 */
  readonly norm: (zeta: number) => number;
  /** its root number n (from 1) is the only one inside the bracket and is zeta_n; free of poles */
  readonly characteristic: (zeta: number, biot: number) => number;
  /** the interval that holds root n for a Biot number that is positive and finite */
  readonly bracket: (n: number) => readonly [number, number];
  /** the same for a held surface (Biot number infinite), where S(1) = 0 */
  readonly heldBracket: (n: number) => readonly [number, number];
}

/** Below this the closed forms of the sphere lose digits to cancellation and their power series take over. */
const SERIES_BELOW = 0.5;

export const GEOMETRIES: Readonly<Record<Geometry, GeometryFunctions>> = {
  slab: {
    dimension: 1,
    shape: Math.cos,
    steepness: Math.sin,
    mean: sinc,
    norm: (zeta) => (1 + sinc(2 * zeta)) / 2,
    characteristic: (zeta, biot) => zeta * Math.sin(zeta) - biot * Math.cos(zeta),
    // root n lies between n - 1 and n - 1/2; with room on both sides for roots that rounding puts on the edge
    bracket: (n) => [(n === 1 ? 0 : n - 1.25) * Math.PI, (n - 0.25) * Math.PI],
    heldBracket: (n) => [(n - 0.75) * Math.PI, (n - 0.25) * Math.PI],
  },
  cylinder: {
    dimension: 2,
    shape: besselJ0,
    steepness: besselJ1,
    mean: (zeta) => (zeta === 0 ? 1 : (2 * besselJ1(zeta)) / zeta),
    norm: (zeta) => (besselJ0(zeta) ** 2 + besselJ1(zeta) ** 2) / 2,
    characteristic: (zeta, biot) => zeta * besselJ1(zeta) - biot * besselJ0(zeta),
    // root n lies between zero n - 1 of J1 and zero n of J0, and both lie in this interval
    bracket: (n) => [(n - 1) * Math.PI, n * Math.PI],
    heldBracket: (n) => [(n - 0.5) * Math.PI, n * Math.PI],
  },
  sphere: {
    dimension: 3,
    shape: sinc,
    steepness: (zeta) => (zeta * ballMean(zeta)) / 3,
    mean: ballMean,
    norm: (zeta) => ballNorm(zeta) / 3,
    // (sin zeta - zeta cos zeta) / zeta - Bi sin(zeta) / zeta
    characteristic: (zeta, biot) => (zeta * zeta * ballMean(zeta)) / 3 - biot * sinc(zeta),
    // root n lies below n; the next one lies above n + 0.43
    bracket: (n) => [(n - 1) * Math.PI, (n + 0.25) * Math.PI],
    heldBracket: (n) => [(n - 0.5) * Math.PI, (n + 0.5) * Math.PI],
  },
};

function sinc(x: number): number {
  return x === 0 ? 1 : Math.sin(x) / x;
}

/** 3 (sin z - z cos z) / z^3, 1 at 0. */
function ballMean(z: number): number {
  if (Math.abs(z) >= SERIES_BELOW) return (3 * (Math.sin(z) - z * Math.cos(z))) / (z * z * z);
  const y = z * z;
  return 1 - (y / 10) * (1 - (y / 28) * (1 - (y / 54) * (1 - (y / 88) * (1 - y / 130))));
}

/** 3 (2 z - sin 2 z) / (4 z^3), 1 at 0: three times the integral of xi^2 S^2. */
function ballNorm(z: number): number {
  if (Math.abs(z) >= SERIES_BELOW) return (3 * (2 * z - Math.sin(2 * z))) / (4 * z * z * z);
  const y = 4 * z * z;
  return 1 - (y / 20) * (1 - (y / 42) * (1 - (y / 72) * (1 - (y / 110) * (1 - (y / 156) * (1 - y / 210)))));
}
