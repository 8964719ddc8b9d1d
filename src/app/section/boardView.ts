/** Holds where the part stands on the board: fitted into the free room, moved softly, or moved by hand. */
import { between, fitView, prefersLying } from "./view.ts";
import type { Bounds, Frame, View } from "./view.ts";

/** What the board knows about its room. */
export interface BoardRoom {
  readonly width: number;
  readonly height: number;
  /** width of the left scale, height of the bottom scale [px] */
  readonly left: number;
  readonly foot: number;
  /** px at the right that a card takes; 0 without one */
  readonly card: number;
  /** the board is wide: sizes stand further off */
  readonly big: boolean;
}

export class BoardView {
  #view: View = { lying: true, scale: 500, x: 100, y: 100 };
  /** which way the part was turned by hand; null: as its shape asks */
  #turned: boolean | null = null;
  #moving = 0;
  #fitted = "";

  /** @param changed called when the view has changed */
  constructor(private readonly changed: () => void) {}

  get view(): View {
    return this.#view;
  }

  /** Moved by hand: it stays until the next fit. */
  set view(view: View) {
    cancelAnimationFrame(this.#moving);
    this.#view = view;
    this.changed();
  }

  lying(bounds: Bounds): boolean {
    return this.#turned ?? prefersLying(bounds);
  }

  turn(lying: boolean, bounds: Bounds): void {
    this.#turned = lying === prefersLying(bounds) ? null : lying;
  }

  /** Whether what has to be seen, or the free room, has changed since the last fit. */
  isStale(bounds: Bounds, room: BoardRoom): boolean {
    return this.#fitted !== this.#key(bounds, room);
  }

  #key(bounds: Bounds, room: BoardRoom): string {
    return JSON.stringify([bounds, room, this.#turned]);
  }

  /** Fits the part into the free room, in a move of `lasts` ms where the eye should follow. */
  fit(bounds: Bounds, room: BoardRoom, lasts: number): void {
    const lying = this.lying(bounds);
    const target = fitView(bounds, frameOf(room, lying), lying);
    const from = this.#view;
    this.#fitted = this.#key(bounds, room);
    cancelAnimationFrame(this.#moving);
    if (lasts === 0 || from.lying !== lying) {
      this.#view = target;
      return this.changed();
    }
    const began = performance.now();
    const move = (now: number): void => {
      const share = Math.min(1, Math.max(0, (now - began) / lasts));
      this.#view = share < 1 ? between(from, target, 1 - (1 - share) ** 3) : target;
      this.changed();
      if (share < 1) this.#moving = requestAnimationFrame(move);
    };
    this.#moving = requestAnimationFrame(move);
  }

  stop(): void {
    cancelAnimationFrame(this.#moving);
  }
}

/** Room that the part may take: inside the scales, clear of the card, with room for its sizes. */
function frameOf({ width, height, left, foot, card, big }: BoardRoom, lying: boolean): Frame {
  const row = big ? 32 : 26;
  const pads = lying
    ? { left: 62, right: 58, top: 34, bottom: 2 * row + 34 }
    : { left: 2 * row + 32, right: 40, top: row + 34, bottom: row + 52 };
  return {
    left: left + pads.left,
    right: width - card - pads.right,
    top: pads.top,
    bottom: height - foot - pads.bottom,
  };
}
