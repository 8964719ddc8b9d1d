/** What a material is at a temperature, and what it is on the average of a range. */
import type { Material } from "../case/types.ts";
import { evaluateCurve, isConstant, meanOfCurve } from "./curve.ts";
import { thermalDiffusivity } from "./groups.ts";

export interface MaterialState {
  /** W/(m K) */
  readonly conductivity: number;
  /** rho c [J/(m3 K)], without latent heat */
  readonly volumetricHeatCapacity: number;
  /** m2/s */
  readonly diffusivity: number;
}

/** The material at one temperature [degC]; tables saturate at their ends. Latent heat is not part of it. */
export function materialAt(material: Material, temperature: number): MaterialState {
  return stateOf(
    evaluateCurve(material.conductivity, temperature),
    material.density * evaluateCurve(material.heatCapacity, temperature),
  );
}

/**
 * The material on the average of a range of temperatures [degC]: mean conductivity and mean heat capacity, each
 * exact for its table. Good for the heat exchanged over the range; only a stand-in for the times in between.
 */
export function materialOverRange(material: Material, from: number, to: number): MaterialState {
  return stateOf(
    meanOfCurve(material.conductivity, from, to),
    material.density * meanOfCurve(material.heatCapacity, from, to),
  );
}

/** Whether neither conductivity nor heat capacity changes with temperature and nothing melts. */
export function isConstantMaterial(material: Material): boolean {
  return (
    isConstant(material.conductivity) && isConstant(material.heatCapacity) && material.latent === undefined
  );
}

function stateOf(conductivity: number, volumetricHeatCapacity: number): MaterialState {
  const diffusivity = thermalDiffusivity(conductivity, volumetricHeatCapacity);
  return { conductivity, volumetricHeatCapacity, diffusivity };
}
