import { execFileSync } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { loadavg, tmpdir } from "node:os";
import { join } from "node:path";
import { beginCell, type CellResult, computePlan, planPaper, type SplitCell } from "../app/cells/index.ts";
import { readPaper } from "../app/paper/index.ts";
import { mergeCounts, planSimulation, type SimulatedCounts, simulateChunks } from "../app/solvers/index.ts";
import { computeInParts } from "../server/compute/in-parts.ts";
import { Pool } from "../server/compute/pool.ts";
import { printRows } from "./table.ts";
import { summary, type Timing } from "./timing.ts";

const DRIFT = 2;
const START = 1;
const CUT = 5;
const REPLICATES = 100_000;
const RUNS = 15;
/** One thread of C at -O3 may be so much quicker. */
const AGAINST_C = 1.5;
/** Two workers on two free cores take so much of the time of one. */
const AGAINST_ONE = 1 / 1.8;

/** Times the exact simulation of K: one worker beside C compiled here, and two workers beside one. */
export async function printSimulation(): Promise<void> {
  const folder = mkdtempSync(join(tmpdir(), "halfline-bench-"));
  try {
    printOneWorker(compiled(folder));
  } finally {
    rmSync(folder, { recursive: true });
  }
  await printTwoWorkers();
}

/** The peer as a program, by gcc. */
function compiled(folder: string): string {
  const program = join(folder, "simulation-peer");
  const source = join(import.meta.dirname, "simulation-peer.c");
  execFileSync("gcc", ["-O3", "-march=native", "-o", program, source, "-lm"]);
  return program;
}

/** Run by turns, in milliseconds of processor time, so that what else the machine does falls on both. */
function printOneWorker(program: string): void {
  const plan = planSimulation(
    { drift: DRIFT, rate: 1, diffusion: 0.5, offspring: { law: "finite", probabilities: [0, 0, 1] } },
    [{ position: START, particles: 1 }],
    { replicates: (RUNS + 1) * REPLICATES, seed: 1, cut: CUT, cap: null },
  );
  if ("refused" in plan) throw new Error(plan.refused);
  const chunks = REPLICATES / 1000;
  const [ours, theirs]: [number[], number[]] = [[], []];
  const counts: SimulatedCounts[] = [];
  let absorbed = 0;
  let steps = 0;
  for (let run = 0; run <= RUNS; run += 1) {
    const begun = process.cpuUsage();
    const count = simulateChunks(plan, run * chunks, (run + 1) * chunks);
    const used = process.cpuUsage(begun);
    const [ms = "", taken = "", hits = ""] =
      execFileSync(program, [REPLICATES, DRIFT, 1, 0.5, START, CUT, 2].map(String))
        .toString()
        .trim()
        .split("\n")[1]
        ?.split(" ") ?? [];
    // The first run compiles.
    if (run === 0) continue;
    counts.push(count);
    ours.push((used.user + used.system) / 1000);
    theirs.push(Number(ms));
    steps += Number(taken);
    absorbed += Number(hits);
  }
  const c: Timing = summary(theirs);
  const name = `${REPLICATES} trees, drift ${DRIFT}, cut at ${CUT}`;
  printRows("simulation of K, ms of processor time", [
    { name: `C, gcc -O3, one thread: ${name}`, timing: c },
    { name: `one worker: ${name}`, timing: summary(ours), against: c, bound: AGAINST_C },
  ]);
  const merged = mergeCounts(counts);
  const mean = merged.n.reduce((sum, n, i) => sum + n * (merged.hits[i] ?? 0), 0) / (RUNS * REPLICATES);
  const perStep = (ms: number, taken: number): string => ((ms * 1e6) / taken).toFixed(1);
  console.log(
    `Least per particle step: ${perStep(c.least * RUNS, steps)} ns in C, ${perStep(summary(ours).least * RUNS, merged.steps)} ns here. Mean of K: ${(absorbed / (RUNS * REPLICATES)).toFixed(5)} in C (one stream), ${mean.toFixed(5)} here, exact ${Math.exp(-(DRIFT + Math.sqrt(DRIFT * DRIFT - 2))).toFixed(5)}.`,
  );
}

const SPLIT_REPLICATES = 30_000_000;
const SPLIT_RUNS = 3;

async function printTwoWorkers(): Promise<void> {
  const text = [
    "```process shore\ndrift: -2\nrate: 1\n```\n",
    `\`\`\`simulate S\nof: shore\nstart: 1\nreplicates: ${SPLIT_REPLICATES}\n\`\`\`\n`,
  ].join("\n");
  const plan = planPaper(readPaper(text, ""));
  const shore = computePlan(plan, { only: ["shore"] }).get("shore");
  const task = plan.byId.get("S")?.task;
  if (shore?.status !== "computed" || !task) throw new Error("The paper of the bench cannot be computed.");
  const split = beginCell(task, new Map<string, CellResult>([["shore", shore.result]]));
  if (split.status !== "split") throw new Error("The simulation of the bench does not split.");

  const pools = [1, 2].map((threads) => new Pool({ threads, cellLimitMs: 600_000 }));
  try {
    const times: number[][] = [[], []];
    for (let run = 0; run <= SPLIT_RUNS; run += 1)
      for (const [i, pool] of pools.entries()) {
        const begun = performance.now();
        await inParts(pool, task, split);
        // The first run starts the threads.
        if (run > 0) times[i]?.push(performance.now() - begun);
      }
    const one = summary(times[0] ?? []);
    printRows(`simulation in ${split.count} parts, ms of the clock`, [
      { name: "one worker", timing: one },
      { name: "two workers", timing: summary(times[1] ?? []), against: one, bound: AGAINST_ONE },
    ]);
    console.log(
      `Load of the machine in the last minute: ${(loadavg()[0] ?? 0).toFixed(1)}; the bound holds for two free cores.`,
    );
  } finally {
    await Promise.all(pools.map((pool) => pool.close()));
  }
}

async function inParts(pool: Pool, task: Parameters<typeof beginCell>[0], split: SplitCell): Promise<void> {
  const parts = { find: async () => [], keep: async () => undefined };
  const hooks = { begun: async () => undefined, progress: () => undefined, ended: async () => undefined };
  const outcome = await computeInParts({ pool, parts }, task, split, hooks, new AbortController().signal);
  if (outcome.status !== "computed") throw new Error(`The simulation of the bench is ${outcome.status}.`);
}
