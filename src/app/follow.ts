/** Joins signals to a Lit element: the element is drawn again when one of the values it follows changes. */
import { effect } from "@preact/signals-core";
import type { ReactiveController, ReactiveControllerHost } from "lit";

export class Follow implements ReactiveController {
  #stop: (() => void) | undefined;

  /** @param read reads every signal to be followed; what it gives back is not used */
  constructor(
    private readonly host: ReactiveControllerHost,
    private readonly read: () => unknown,
  ) {
    host.addController(this);
  }

  hostConnected(): void {
    this.#stop = effect(() => {
      this.read();
      this.host.requestUpdate();
    });
  }

  hostDisconnected(): void {
    this.#stop?.();
  }
}
