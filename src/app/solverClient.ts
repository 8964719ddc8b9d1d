/**
 * The page's side of the solver: one worker, one long-lived proxy, the newest edit wins. While the hand moves, one
 * preview runs at a time and the latest document waits behind it; a settling run gives way to any edit. A worker that
 * dies is started once more; when that one dies too, the page is told and can try again.
 */
import { proxy, releaseProxy, wrap } from "comlink";
import type { Remote } from "comlink";
import type { CaseDocument } from "../case/types.ts";
import type { SolveOutcome } from "../run/result.ts";
import type { SolveEvent, Solver, SolveRequest } from "../../workers/protocol.ts";

export type Depth = SolveRequest["depth"];

export interface SolverTold {
  /** a run of this document has begun, or gone on */
  readonly event: (event: SolveEvent, document: CaseDocument) => void;
  readonly outcome: (outcome: SolveOutcome, document: CaseDocument, depth: Depth) => void;
  /** the worker died and was started again; the run goes on */
  readonly restarted: () => void;
  /** the worker cannot be kept running */
  readonly broken: (why: string) => void;
}

interface Job {
  readonly number: number;
  readonly document: CaseDocument;
  readonly depth: Depth;
}

/** Deaths of the worker in a row after which it is given up. */
const MOST_DEATHS = 2;

export class SolverClient {
  #worker: Worker | null = null;
  #solver: Remote<Solver> | null = null;
  #running: Job | null = null;
  #waiting: { document: CaseDocument; depth: Depth } | null = null;
  #number = 0;
  #deaths = 0;

  /** @param start makes the worker; tests give one that dies */
  constructor(
    private readonly told: SolverTold,
    private readonly start: () => Worker = startWorker,
  ) {}

  /** Starts the worker and lets it compile, so that the first edit is answered quickly. */
  warm(): void {
    this.#open()
      ?.warm()
      .catch(() => undefined);
  }

  /** Asks for a document; an older run is dropped, but a preview under way is let finish. */
  ask(document: CaseDocument, depth: Depth): void {
    if (this.#running?.depth === "preview" && depth === "preview") {
      this.#waiting = { document, depth };
      return;
    }
    this.#waiting = null;
    void this.#run({ number: ++this.#number, document, depth });
  }

  cancel(): void {
    this.#waiting = null;
    const running = this.#running;
    this.#running = null;
    if (running) void this.#solver?.cancel(running.number);
  }

  /** After `broken`: a fresh worker, and the document again. */
  retry(document: CaseDocument): void {
    this.#deaths = 0;
    this.ask(document, "settle");
  }

  close(): void {
    this.cancel();
    this.#shut();
  }

  async #run(job: Job): Promise<void> {
    const solver = this.#open();
    if (!solver) return;
    this.#running = job;
    const onEvent = proxy((event: SolveEvent) => {
      if (this.#running === job) this.told.event(event, job.document);
    });
    try {
      const outcome = await solver.solve(
        { job: job.number, document: job.document, depth: job.depth },
        onEvent,
      );
      this.#deaths = 0;
      this.#finish(job, outcome);
    } catch (error) {
      if (this.#running === job) this.#died(error instanceof Error ? error.message : String(error));
    }
  }

  #finish(job: Job, outcome: SolveOutcome): void {
    if (this.#running !== job) return;
    this.#running = null;
    const next = this.#waiting;
    this.#waiting = null;
    if (outcome.kind !== "cancelled") this.told.outcome(outcome, job.document, job.depth);
    if (next) this.ask(next.document, next.depth);
  }

  #open(): Remote<Solver> | null {
    if (this.#solver) return this.#solver;
    try {
      this.#worker = this.start();
    } catch (error) {
      this.told.broken(error instanceof Error ? error.message : String(error));
      return null;
    }
    this.#worker.addEventListener("error", (event) => this.#died(event.message || "it could not be loaded"));
    this.#worker.addEventListener("messageerror", () => this.#died("a message was damaged"));
    this.#solver = wrap<Solver>(this.#worker);
    return this.#solver;
  }

  #died(why: string): void {
    const job = this.#running;
    this.#running = null;
    const next = this.#waiting ?? (job && { document: job.document, depth: job.depth });
    this.#waiting = null;
    this.#shut();
    if (++this.#deaths >= MOST_DEATHS) return this.told.broken(why);
    this.told.restarted();
    if (next) this.ask(next.document, next.depth);
  }

  #shut(): void {
    this.#solver?.[releaseProxy]();
    this.#worker?.terminate();
    this.#solver = null;
    this.#worker = null;
  }
}

function startWorker(): Worker {
  return new Worker(new URL("../../workers/solve.worker.ts", import.meta.url), {
    type: "module",
    name: "corelag solver",
  });
}
