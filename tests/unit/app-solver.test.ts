/** The page's side of the solver, against a worker that is played by a message channel. */
import { expose } from "comlink";
import { afterEach, describe, expect, it } from "vitest";
import { SolverClient } from "../../src/app/solverClient.ts";
import type { CaseDocument } from "../../src/case/types.ts";
import type { SolveOutcome } from "../../src/run/result.ts";
import type { Solver, SolveRequest } from "../../workers/protocol.ts";
import { ingot } from "./editor/ingot.ts";

/** Worker played in this thread: each solve waits until it is let go. */
class PlayedWorker extends EventTarget {
  static all: PlayedWorker[] = [];
  readonly asked: SolveRequest[] = [];
  readonly cancelled: number[] = [];
  terminated = false;
  #release: ((outcome: SolveOutcome) => void)[] = [];
  readonly #channel = new MessageChannel();

  constructor() {
    super();
    PlayedWorker.all.push(this);
    const solver: Solver = {
      warm: () => Promise.resolve(),
      solve: (request) => {
        this.asked.push(request);
        return new Promise((resolve) => this.#release.push(resolve));
      },
      cancel: (job) => void this.cancelled.push(job),
    };
    expose(solver, this.#channel.port1 as never);
    this.#channel.port1.start();
    this.#channel.port2.addEventListener("message", (event) =>
      this.dispatchEvent(new MessageEvent("message", { data: (event as MessageEvent).data as unknown })),
    );
    this.#channel.port2.start();
  }
  postMessage(message: unknown, transfer: Transferable[] = []): void {
    this.#channel.port2.postMessage(message, transfer as never);
  }
  terminate(): void {
    this.terminated = true;
    this.#channel.port2.close();
  }
  /** Ends the oldest open solve. */
  finish(outcome: SolveOutcome = { kind: "cancelled" }): void {
    this.#release.shift()?.(outcome);
  }
  die(): void {
    this.dispatchEvent(Object.assign(new Event("error"), { message: "killed" }));
  }
}

const settle = (): Promise<void> => new Promise((resolve) => setTimeout(resolve, 25));
const titled = (title: string): CaseDocument => ({ ...ingot(), title });
const titleOf = (request: SolveRequest | undefined): unknown =>
  (request?.document as CaseDocument | undefined)?.title;

function client() {
  const told: string[] = [];
  const solver = new SolverClient(
    {
      event: () => undefined,
      outcome: (outcome, document) => void told.push(`${outcome.kind} ${document.title}`),
      restarted: () => void told.push("restarted"),
      broken: (why) => void told.push(`broken: ${why}`),
    },
    () => new PlayedWorker() as unknown as Worker,
  );
  return { solver, told };
}
const refused: SolveOutcome = { kind: "refused", problems: [] };

describe("the page's side of the solver", () => {
  afterEach(() => {
    PlayedWorker.all = [];
  });

  it("while a preview runs only the newest document waits", async () => {
    const { solver, told } = client();
    solver.ask(titled("1"), "preview");
    for (const title of ["2", "3", "4"]) solver.ask(titled(title), "preview");
    await settle();
    const [worker] = PlayedWorker.all;
    expect(worker!.asked.map(titleOf)).toEqual(["1"]);
    worker!.finish(refused);
    await settle();
    expect(worker!.asked.map(titleOf)).toEqual(["1", "4"]);
    expect(told).toEqual(["refused 1"]);
    solver.close();
  });

  it("an edit takes over from a settling run at once, and the old outcome is not told", async () => {
    const { solver, told } = client();
    solver.ask(titled("old"), "settle");
    solver.ask(titled("new"), "preview");
    await settle();
    const [worker] = PlayedWorker.all;
    expect(worker!.asked.map(titleOf)).toEqual(["old", "new"]);
    expect(worker!.asked[1]!.job).toBeGreaterThan(worker!.asked[0]!.job);
    worker!.finish(refused);
    worker!.finish(refused);
    await settle();
    expect(told).toEqual(["refused new"]);
    solver.close();
  });

  it("a worker that dies is started once more with the newest document; then the page is told", async () => {
    const { solver, told } = client();
    solver.ask(titled("a"), "settle");
    await settle();
    PlayedWorker.all[0]!.die();
    await settle();
    expect(told).toEqual(["restarted"]);
    expect(PlayedWorker.all[0]!.terminated).toBe(true);
    expect(titleOf(PlayedWorker.all[1]!.asked[0])).toBe("a");
    PlayedWorker.all[1]!.die();
    await settle();
    expect(told).toEqual(["restarted", "broken: killed"]);
    solver.retry(titled("b"));
    await settle();
    expect(titleOf(PlayedWorker.all[2]!.asked[0])).toBe("b");
    solver.close();
  });

  it("a worker that cannot be made is told", () => {
    const told: string[] = [];
    const solver = new SolverClient(
      {
        event: () => undefined,
        outcome: () => undefined,
        restarted: () => undefined,
        broken: (why) => void told.push(why),
      },
      () => {
        throw new Error("no workers here");
      },
    );
    solver.ask(titled("a"), "settle");
    expect(told).toEqual(["no workers here"]);
  });

  it("a cancelled run is cancelled in the worker and not told", async () => {
    const { solver, told } = client();
    solver.ask(titled("a"), "settle");
    await settle();
    solver.cancel();
    await settle();
    const [worker] = PlayedWorker.all;
    expect(worker!.cancelled).toEqual([worker!.asked[0]!.job]);
    worker!.finish(refused);
    await settle();
    expect(told).toEqual([]);
    solver.close();
  });
});
