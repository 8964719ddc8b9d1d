/** The two scales of the treatment chart and the room they stand in. */
import { scaleLinear } from "d3-scale";
import { fromShown, toShown } from "../../case/units.ts";
import type { UnitSystem } from "../../case/units.ts";
import { temperatureGraduations, timeGraduations } from "./graduations.ts";
import type { TemperatureGraduations, TimeGraduations } from "./graduations.ts";

/** px, from the size of the element and the tokens */
export interface Room {
  readonly width: number;
  readonly height: number;
  /** left edge of the plot: the temperature scale stands before it */
  readonly left: number;
  readonly right: number;
  /** height of the row of stages, and of the time scale */
  readonly row: number;
  readonly foot: number;
  readonly noteSize: number;
  readonly bodySize: number;
  readonly scaleSize: number;
}

export interface Scales {
  readonly room: Room;
  /** top and bottom of the plot */
  readonly top: number;
  readonly bottom: number;
  /** last instant that the scale holds [s] */
  readonly end: number;
  /** px of a time [s] and back */
  readonly x: (seconds: number) => number;
  readonly seconds: (x: number) => number;
  /** px of a temperature [degC] and back */
  readonly y: (degC: number) => number;
  readonly degC: (y: number) => number;
  readonly time: TimeGraduations;
  readonly temperature: TemperatureGraduations;
}

/** Room behind the last stage, as a share of the treatment: the next stage is asked for there. */
export const ROOM_BEHIND = 0.14;

export function makeScales(
  room: Room,
  lasts: number,
  temperatures: readonly [number, number],
  system: UnitSystem,
): Scales {
  const top = room.row + 8;
  const bottom = room.height - room.foot;
  const end = lasts * (1 + ROOM_BEHIND);
  const low = toShown(temperatures[0], "temperature", system);
  const high = toShown(temperatures[1], "temperature", system);
  const temperature = temperatureGraduations(low, high, bottom - top);
  const x = scaleLinear([0, end], [room.left, room.width - room.right]);
  const y = scaleLinear([temperature.from, temperature.to], [bottom, top]);
  return {
    room,
    top,
    bottom,
    end,
    x: (seconds) => x(seconds),
    seconds: (at) => x.invert(at),
    y: (degC) => y(toShown(degC, "temperature", system)),
    degC: (at) => fromShown(y.invert(at), "temperature", system),
    time: timeGraduations(end, room.width - room.right - room.left),
    temperature,
  };
}
