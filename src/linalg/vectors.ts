/** The few dense vector operations that iterations need, on plain Float64Arrays of equal length. */

export function dot(x: Float64Array, y: Float64Array): number {
  let even = 0;
  let odd = 0;
  const pairs = x.length & ~1;
  for (let i = 0; i < pairs; i += 2) {
    even += x[i]! * y[i]!;
    odd += x[i + 1]! * y[i + 1]!;
  }
  if (pairs < x.length) even += x[pairs]! * y[pairs]!;
  return even + odd;
}

/** out += factor x */
export function addScaled(factor: number, x: Float64Array, out: Float64Array): Float64Array {
  for (let i = 0; i < x.length; i++) out[i]! += factor * x[i]!;
  return out;
}

export function scale(factor: number, out: Float64Array): Float64Array {
  for (let i = 0; i < out.length; i++) out[i]! *= factor;
  return out;
}

export function largestMagnitude(x: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < x.length; i++) {
    const value = Math.abs(x[i]!);
    if (value > largest) largest = value;
  }
  return largest;
}

export function largestDifference(x: Float64Array, y: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < x.length; i++) {
    const value = Math.abs(x[i]! - y[i]!);
    if (value > largest) largest = value;
  }
  return largest;
}
