import type { Told } from "../model/messages.ts";

/** Begun with the first sheet's scripts, while the page is still being taken hold of: reading it in takes its time. */
let begun: Worker | null = typeof document !== "undefined" && typeof Worker !== "undefined" ? newWorker() : null;

/**
 * The page's worker, begun before the live sheet is here: it reads the text that the server sent with the page while
 * the sheet's own scripts are still on their way, so that the first question finds the text read.
 */
export class ReaderAhead {
  private worker: Worker | null = null;

  begin(text: string, bibliography: string): void {
    this.worker = openWorker();
    this.worker.postMessage({ message: { tell: "ahead", text, bibliography }, have: 0 } satisfies Told);
  }

  /** The worker, which is the caller's to end; a new one if it was taken before. */
  take(): Worker {
    const taken = this.worker ?? openWorker();
    this.worker = null;
    return taken;
  }

  /** Ends the worker, unless it was taken. */
  end(): void {
    this.worker?.terminate();
    this.worker = null;
  }
}

function openWorker(): Worker {
  const worker = begun ?? newWorker();
  begun = null;
  return worker;
}

function newWorker(): Worker {
  return new Worker(new URL("../reading/paper.worker.ts", import.meta.url), { type: "module" });
}
