/** Plays the time cursor through the treatment, at the pace of the screen. */

/** s of real time for a whole treatment: slow enough to follow, short enough to watch twice */
const WHOLE = 12;

export class Play {
  #frame = 0;
  #last = 0;
  #at = 0;

  constructor(
    private readonly move: (at: number) => void,
    private readonly done: () => void,
  ) {}

  get running(): boolean {
    return this.#frame !== 0;
  }

  /** From `at` to `end` [s of the case]; from the start when the cursor stands at the end. */
  start(at: number, end: number): void {
    this.stop();
    this.#at = at >= end * (1 - 1e-9) ? 0 : at;
    this.#last = performance.now();
    const step = (now: number): void => {
      this.#at = Math.min(end, this.#at + ((now - this.#last) / 1000) * (end / WHOLE));
      this.#last = now;
      this.move(this.#at);
      this.#frame = this.#at < end ? requestAnimationFrame(step) : 0;
      if (this.#frame === 0) this.done();
    };
    this.#frame = requestAnimationFrame(step);
  }

  stop(): void {
    cancelAnimationFrame(this.#frame);
    this.#frame = 0;
  }
}
