/** The dimensionless groups of transient conduction. The length is always passed, never guessed. */

/**
 * Biot number h L / k: resistance inside over resistance at the skin.
 *
 * L is volume over exposed area for the one-temperature estimate, and the half thickness or radius for a series.
 * A held surface is a film without resistance: `film` may be Infinity.
 *
 * @param film          film coefficient [W/(m2 K)], 0 or more
 * @param length        [m], positive
 * @param conductivity  [W/(m K)], positive
 * @throws RangeError outside those ranges
 */
export function biotNumber(film: number, length: number, conductivity: number): number {
  if (!(film >= 0) || !isPositive(length) || !isPositive(conductivity))
    throw new RangeError(`No Biot number for film ${film}, length ${length}, conductivity ${conductivity}`);
  return (film * length) / conductivity;
}

/**
 * Fourier number a t / L2: time in units of the time heat takes to cross the length.
 *
 * @param diffusivity  [m2/s], positive
 * @param time         [s], 0 or more
 * @param length       [m], positive; the same length as in the Biot number beside it
 * @throws RangeError outside those ranges
 */
export function fourierNumber(diffusivity: number, time: number, length: number): number {
  if (!isPositive(diffusivity) || !(time >= 0) || !isPositive(length))
    throw new RangeError(`No Fourier number for diffusivity ${diffusivity}, time ${time}, length ${length}`);
  return (diffusivity * time) / (length * length);
}

/**
 * Thermal diffusivity k / (rho c) [m2/s].
 *
 * @param conductivity            [W/(m K)], positive
 * @param volumetricHeatCapacity  rho c [J/(m3 K)], positive
 * @throws RangeError outside those ranges
 */
export function thermalDiffusivity(conductivity: number, volumetricHeatCapacity: number): number {
  if (!isPositive(conductivity) || !isPositive(volumetricHeatCapacity))
    throw new RangeError(
      `No diffusivity for conductivity ${conductivity}, heat capacity per volume ${volumetricHeatCapacity}`,
    );
  return conductivity / volumetricHeatCapacity;
}

function isPositive(x: number): boolean {
  return x > 0 && Number.isFinite(x);
}
