/**
 * Right-hand sides of implicit steps,  (C + weight K) u = C u_before + load,  held unknowns moved over. While the
 * signals stand still the vector of one weight is worked out once.
 */
import { heldValue, type InnerSystem } from "./innerSystem.ts";
import { signalAt } from "./signals.ts";

interface Made {
  readonly key: readonly number[];
  readonly vector: Float64Array;
}

export class StepLoads {
  private readonly made: Made[] = [];

  /** @param kept  vectors kept: as many as weights take turns */
  constructor(
    private readonly system: InnerSystem,
    private readonly kept: number,
  ) {}

  /**
   * weight * loads at `time` less what held unknowns couple in on the free rows, diagonal times held value on the held
   * rows. Belongs to a product C u_before whose held rows are zero; not to be written to.
   */
  at(weight: number, time: number): Float64Array {
    const { loads, held } = this.system;
    const key = [
      weight,
      ...loads.map(({ signal }) => signalAt(signal, time)),
      ...held.map((g) => heldValue(g, time)),
    ];
    const known = this.made.find((entry) => entry.key.every((value, i) => value === key[i]));
    if (known) return known.vector;
    const oldest = this.made.length >= this.kept ? this.made.shift() : undefined;
    const vector = oldest?.vector.fill(0) ?? new Float64Array(this.system.pattern.size);
    this.fill(weight, key, vector);
    this.made.push({ key, vector });
    return vector;
  }

  private fill(weight: number, key: readonly number[], out: Float64Array): void {
    const { loads, held, pattern, capacity, conductance, heldMask } = this.system;
    loads.forEach(({ vector }, g) => {
      const amount = weight * key[1 + g]!;
      if (amount !== 0) for (let i = 0; i < out.length; i++) out[i]! += amount * vector[i]!;
    });
    if (heldMask) for (let i = 0; i < out.length; i++) if (heldMask[i]) out[i] = 0;
    held.forEach(({ unknowns, capacityColumn, conductanceColumn }, g) => {
      const value = key[1 + loads.length + g]!;
      for (let i = 0; i < out.length; i++)
        out[i]! -= value * (capacityColumn[i]! + weight * conductanceColumn[i]!);
      for (const i of unknowns) {
        const place = pattern.diagonal[i]!;
        out[i] = value * (capacity[place]! + weight * conductance[place]!);
      }
    });
  }
}
