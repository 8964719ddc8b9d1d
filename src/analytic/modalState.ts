/**
 * A temperature field of a simple body as a double sum of modes, and its way through time.
 *
 * With E the surroundings, modes n of the first direction and m of the second (trivial for slab, cylinder and sphere),
 *
 *   T - E = sum of a_nm S_n(xi) Z_m(eta),   da_nm/dt = -lambda_nm a_nm - C_n C_m dE/dt,
 *   lambda_nm = alpha (zeta_n^2 / L1^2 + zeta_m^2 / L2^2),
 *
 * so that surroundings that run straight in time are followed exactly.
 */
import type { Geometry } from "./geometry.ts";
import { firstPhi } from "./lumped.ts";
import { spectrumOf } from "./spectrum.ts";
import type { Mode } from "./spectrum.ts";

/** The modes of one direction. */
export interface ModalDirection {
  readonly geometry: Geometry;
  readonly biot: number;
  readonly modes: readonly Mode[];
  /** diffusivity over length squared [1/s] */
  readonly rate: number;
}

export interface ModalState {
  readonly first: ModalDirection;
  readonly second: ModalDirection;
  /** a_nm [K], row n, as many columns as the second direction has modes */
  readonly amplitudes: Float64Array;
  /** E [degC] */
  readonly ambient: number;
}

/** Weighted sums of a field: at the core, its mean, at wall, end and edge, and the first mode alone at the core. */
export interface Readings {
  readonly core: number;
  readonly mean: number;
  /** surface of the first direction, mean over the second; and the other way round */
  readonly wall: number;
  readonly end: number;
  readonly edge: number;
  readonly firstMode: number;
}

export function modalDirection(
  geometry: Geometry,
  biot: number,
  rate: number,
  count: number,
): ModalDirection {
  return { geometry, biot, rate, modes: spectrumOf(geometry, biot).modes(count) };
}

/** The second direction of a body that has only one. */
export const NO_DIRECTION: ModalDirection = modalDirection("slab", 0, 0, 1);

/** A body at one temperature, `excess` [K] over its surroundings. */
export function uniformState(
  first: ModalDirection,
  second: ModalDirection,
  excess: number,
  ambient: number,
): ModalState {
  const amplitudes = outer(first, second, (a, b) => excess * a.coefficient * b.coefficient);
  return { first, second, amplitudes, ambient };
}

/** The state `time` [s] later, the surroundings running straight with `slope` [K/s]. */
export function stateAfter(state: ModalState, slope: number, time: number): ModalState {
  const { first, second, amplitudes } = state;
  const columns = second.modes.length;
  const moved = amplitudes.map((amplitude, i) => {
    const [a, b] = [first.modes[Math.floor(i / columns)]!, second.modes[i % columns]!];
    const z = -(first.rate * a.zeta * a.zeta + second.rate * b.zeta * b.zeta) * time;
    return amplitude * Math.exp(z) - a.coefficient * b.coefficient * slope * time * firstPhi(z);
  });
  return { first, second, amplitudes: moved, ambient: state.ambient + slope * time };
}

/** The same field in the modes of other films, in surroundings at another temperature. */
export function projectState(
  state: ModalState,
  first: ModalDirection,
  second: ModalDirection,
  ambient: number,
): ModalState {
  if (state.first.biot === first.biot && state.second.biot === second.biot && sameCount(state, first, second))
    return shifted(state, ambient);
  const offset = state.ambient - ambient;
  const [left, right] = [overlaps(state.first, first), overlaps(state.second, second)];
  const [rows, columns] = [state.first.modes.length, state.second.modes.length];
  const count = second.modes.length;
  // two products of matrices: rows first, then columns
  const half = new Float64Array(rows * count);
  for (let n = 0; n < rows; n++)
    for (let q = 0; q < count; q++)
      for (let m = 0; m < columns; m++)
        half[n * count + q]! += state.amplitudes[n * columns + m]! * right[q * columns + m]!;
  const amplitudes = outer(first, second, (a, b) => offset * a.coefficient * b.coefficient);
  for (let p = 0; p < first.modes.length; p++)
    for (let n = 0; n < rows; n++)
      for (let q = 0; q < count; q++)
        amplitudes[p * count + q]! += left[p * rows + n]! * half[n * count + q]!;
  return { first, second, amplitudes, ambient };
}

function sameCount(state: ModalState, first: ModalDirection, second: ModalDirection): boolean {
  return state.first.modes.length === first.modes.length && state.second.modes.length === second.modes.length;
}

/** The same field seen from surroundings at another temperature. */
function shifted(state: ModalState, ambient: number): ModalState {
  const offset = state.ambient - ambient;
  const uniform = outer(state.first, state.second, (a, b) => offset * a.coefficient * b.coefficient);
  return { ...state, amplitudes: state.amplitudes.map((value, i) => value + uniform[i]!), ambient };
}

/** A field on its way while the surroundings run straight: what readings at many instants share. */
export interface StraightRun {
  readonly state: ModalState;
  /** dE/dt [K/s] */
  readonly slope: number;
  /** a_nm + b_nm, b_nm = C_n C_m slope / lambda_nm: the part that dies away */
  readonly moving: Float64Array;
  /** sums of -b_nm: the lag behind the ramp that stays. Without the first mode, which may not decay at all */
  readonly lag: Readings;
}

export function straightRun(state: ModalState, slope: number): StraightRun {
  const { first, second } = state;
  const lagging = outer(first, second, (a, b) => {
    const decay = first.rate * a.zeta * a.zeta + second.rate * b.zeta * b.zeta;
    return slope === 0 || decay === 0 ? 0 : (a.coefficient * b.coefficient * slope) / decay;
  });
  lagging[0] = 0;
  const moving = state.amplitudes.map((amplitude, i) => amplitude + lagging[i]!);
  const lag = sumModes(
    state,
    lagging.map((b) => -b),
    ones(first),
    ones(second),
  );
  return { state, slope, moving, lag };
}

/** Weighted sums of the field [degC] `time` [s] after the state of the run. */
export function readAlong(run: StraightRun, time: number): Readings {
  const { state, slope, moving, lag } = run;
  const sums = sumModes(state, moving, decays(state.first, time), decays(state.second, time));
  const [a, b] = [state.first.modes[0]!, state.second.modes[0]!];
  const z = -(state.first.rate * a.zeta * a.zeta + state.second.rate * b.zeta * b.zeta) * time;
  const forced = -a.coefficient * b.coefficient * slope * time * firstPhi(z);
  const ambient = state.ambient + slope * time;
  return {
    core: ambient + sums.core + lag.core + forced,
    mean: ambient + sums.mean + lag.mean + forced * a.mean * b.mean,
    wall: ambient + sums.wall + lag.wall + forced * a.surface * b.mean,
    end: ambient + sums.end + lag.end + forced * a.mean * b.surface,
    edge: ambient + sums.edge + lag.edge + forced * a.surface * b.surface,
    firstMode: ambient + sums.firstMode + forced,
  };
}

/** Below this a decayed mode is not worth its multiplications. */
const NEGLIGIBLE = 1e-18;

/** exp(-rate zeta^2 time) of each mode, down to the last that still counts. */
function decays(direction: ModalDirection, time: number): number[] {
  const out: number[] = [];
  for (const { zeta } of direction.modes) {
    const decay = Math.exp(-direction.rate * zeta * zeta * time);
    if (decay < NEGLIGIBLE) break;
    out.push(decay);
  }
  return out;
}

function ones(direction: ModalDirection): number[] {
  return direction.modes.map(() => 1);
}

/** Sums over the modes of amplitude times both decays times what each place weighs them with; excess [K]. */
function sumModes(
  { first, second }: ModalState,
  amplitudes: Float64Array,
  firstDecay: readonly number[],
  secondDecay: readonly number[],
): Readings {
  const columns = second.modes.length;
  const means = second.modes.map((mode) => mode.mean);
  const surfaces = second.modes.map((mode) => mode.surface);
  let [core, mean, wall, end, edge] = [0, 0, 0, 0, 0];
  for (let n = 0; n < firstDecay.length; n++) {
    let [centre, average, surface] = [0, 0, 0];
    for (let m = 0; m < secondDecay.length; m++) {
      const amplitude = amplitudes[n * columns + m]! * secondDecay[m]!;
      centre += amplitude;
      average += amplitude * means[m]!;
      surface += amplitude * surfaces[m]!;
    }
    const [mode, decay] = [first.modes[n]!, firstDecay[n]!];
    core += decay * centre;
    mean += decay * mode.mean * average;
    wall += decay * mode.surface * average;
    end += decay * mode.mean * surface;
    edge += decay * mode.surface * surface;
  }
  const firstMode =
    firstDecay.length && secondDecay.length ? amplitudes[0]! * firstDecay[0]! * secondDecay[0]! : 0;
  return { core, mean, wall, end, edge, firstMode };
}

/**
 * Share of each new mode (rows) in each old one (columns): overlap integral over norm. By the self-adjoint form of the
 * equation, (zeta^2 - zeta'^2) times the overlap is S(1) S''(1) - S'(1) S''(1) at the surface alone, old and new.
 */
function overlaps(old: ModalDirection, fresh: ModalDirection): Float64Array {
  const out = new Float64Array(fresh.modes.length * old.modes.length);
  fresh.modes.forEach((b, p) =>
    old.modes.forEach((a, n) => {
      out[p * old.modes.length + n] =
        old.biot === fresh.biot
          ? Number(p === n)
          : surfaceTerm(old, a, fresh, b) / (a.zeta ** 2 - b.zeta ** 2) / b.norm;
    }),
  );
  return out;
}

/** S_old(1) S_new'(1) - S_old'(1) S_new(1); with S' = -Bi S on both, without a difference of near values. */
function surfaceTerm(old: ModalDirection, a: Mode, fresh: ModalDirection, b: Mode): number {
  if (Number.isFinite(old.biot) && Number.isFinite(fresh.biot))
    return a.surface * b.surface * (old.biot - fresh.biot);
  return a.surface * b.surfaceSlope - a.surfaceSlope * b.surface;
}

function outer(first: ModalDirection, second: ModalDirection, f: (a: Mode, b: Mode) => number): Float64Array {
  const out = new Float64Array(first.modes.length * second.modes.length);
  let i = 0;
  for (const a of first.modes) for (const b of second.modes) out[i++] = f(a, b);
  return out;
}
