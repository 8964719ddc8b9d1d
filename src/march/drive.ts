/**
 * How a load acts over time, and how the modes of a small system answer: everything is piecewise linear, jumps allowed
 * between the pieces, so that every answer has a closed form.
 */
import { phi1, phi2, phi3 } from "./phi.ts";
import { signalAt } from "./signals.ts";
import type { Signal } from "./types.ts";

/** Pieces in order, the first from time 0 on: on piece i the load is  values[i] + slopes[i] (t - times[i]). */
export interface Drive {
  readonly times: Float64Array;
  readonly values: Float64Array;
  readonly slopes: Float64Array;
}

/** weight * (a(t) - offset) */
export function signalDrive(signal: Signal, offset: number, weight: number): Drive {
  const times = Float64Array.from(pieceStarts(signal));
  const values = times.map((time) => weight * (signalAt(signal, time) - offset));
  const slopes = times.map((time, i) => weight * slopeAfter(signal, time, times[i + 1]));
  return { times, values, slopes };
}

/** weight * da/dt */
export function slopeDrive(signal: Signal, weight: number): Drive {
  const { times, slopes } = signalDrive(signal, 0, weight);
  return { times, values: slopes, slopes: new Float64Array(times.length) };
}

export function constantDrive(value: number): Drive {
  return { times: Float64Array.of(0), values: Float64Array.of(value), slopes: Float64Array.of(0) };
}

export const isIdle = ({ values, slopes }: Drive): boolean =>
  values.every((value) => value === 0) && slopes.every((slope) => slope === 0);

export const isConstant = ({ times }: Drive): boolean => times.length === 1;

/** 0 and the later knots at which something begins; nothing begins at the end of a table but constancy. */
function pieceStarts({ times, values }: Signal): number[] {
  const later = [...times].filter((time) => time > 0);
  const constant = values.every((value) => value === values[0]);
  return constant ? [0] : [0, ...later];
}

function slopeAfter(signal: Signal, time: number, next: number | undefined): number {
  if (next === undefined) return 0;
  return (signalAt(signal, next) - signalAt(signal, time)) / (next - time);
}

/** What one mode does at an instant. */
export interface ModeState {
  value: number;
  derivative: number;
  /** of the value over [0, time] */
  integral: number;
}

/** Answers of the modes  z' + rate z = a(t),  z(0) = 0,  to one drive. */
export class ModalResponse {
  private readonly count: number;
  /** value and integral of every mode at the beginning of every piece: pieces x modes */
  private readonly values: Float64Array;
  private readonly integrals: Float64Array;

  constructor(
    private readonly drive: Drive,
    private readonly rates: Float64Array,
  ) {
    this.count = rates.length;
    const pieces = drive.times.length;
    this.values = new Float64Array(pieces * this.count);
    this.integrals = new Float64Array(pieces * this.count);
    const state = { value: 0, derivative: 0, integral: 0 };
    for (let piece = 1; piece < pieces; piece++)
      for (let mode = 0; mode < this.count; mode++) {
        this.within(piece - 1, mode, drive.times[piece]! - drive.times[piece - 1]!, state);
        this.values[piece * this.count + mode] = state.value;
        this.integrals[piece * this.count + mode] = state.integral;
      }
  }

  /** The piece that an instant lies in; a knot belongs to the piece that ends there. */
  pieceAt(time: number): number {
    const { times } = this.drive;
    let low = 0;
    let high = times.length;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (times[middle]! < time) low = middle;
      else high = middle;
    }
    return low;
  }

  /** State of one mode at a time in a piece, into `out`. */
  state(piece: number, mode: number, time: number, out: ModeState): ModeState {
    return this.within(piece, mode, time - this.drive.times[piece]!, out);
  }

  private within(piece: number, mode: number, since: number, out: ModeState): ModeState {
    const rate = this.rates[mode]!;
    const x = rate * since;
    const before = this.values[piece * this.count + mode]!;
    const load = this.drive.values[piece]!;
    const slope = this.drive.slopes[piece]!;
    const first = since * phi1(x);
    const second = since * since * phi2(x);
    out.value = Math.exp(-x) * before + load * first + slope * second;
    out.derivative = load + slope * since - rate * out.value;
    out.integral = this.integrals[piece * this.count + mode]! + before * first + load * second;
    if (slope !== 0) out.integral += slope * since * since * since * phi3(x);
    return out;
  }
}
