/**
 * The worker of computations, in which cells of some names misbehave before they compute as usual:
 * `Slow…` takes 300 ms and tells its progress, `Spin…` never ends, `Heap…` fills the memory, `Exit…` ends the thread.
 */
import { type ComputeJob, compute as computeOrderly, merge, part, plan } from "../../server/compute/worker.ts";

const SLOW_MS = 300;

export { merge, part, plan };

export function compute(job: ComputeJob): ReturnType<typeof computeOrderly> {
  const { id } = job.task;
  job.progress.postMessage(null);
  if (id.startsWith("Exit")) process.exit(3);
  if (id.startsWith("Heap")) fillMemory();
  const end = Date.now() + (id.startsWith("Spin") ? Number.POSITIVE_INFINITY : id.startsWith("Slow") ? SLOW_MS : 0);
  let told = false;
  while (Date.now() < end) {
    if (!told) job.progress.postMessage([4, 7]);
    told = true;
  }
  return computeOrderly(job);
}

function fillMemory(): never {
  const held: unknown[] = [];
  for (;;) held.push(new Array(100_000).fill(held.length / 3));
}
