import { readFileSync } from "node:fs";
import { resolve } from "node:path";
import { computePlan, type Plan, planPaper } from "../app/cells/index.ts";
import { readPaper } from "../app/paper/index.ts";
import {
  absorbedLaw,
  absorbedProbability,
  type Estimate,
  type ProcessModel,
  profileConstants,
  type ScaledEstimate,
  solveTrajectory,
  type Trajectory,
  tailLaw,
} from "../app/solvers/index.ts";
import stored from "../tests/solvers/reference.json" with { type: "json" };
import { lnOf, lnOfDecimal, relativeOf } from "./accuracy.ts";
import { integrateTrajectory } from "./odex-trajectory.ts";
import { askPeer, HOW_TO_GET, type PeerAnswer } from "./scipy-peer.ts";
import { printRows, type Row } from "./table.ts";
import { timed } from "./timing.ts";

const UP_TO = 1000;
const MODEL: ProcessModel = {
  drift: 2,
  rate: 1,
  diffusion: 0.5,
  offspring: { law: "finite", probabilities: [0, 0, 1] },
};
const START = [{ position: 1, particles: 1 }];
/** The peer's job takes at least so many times ours. */
const FASTER = 20;
/** All p_n to 10^4 take at most so many times those to 10^3. */
const GROWTH = 25;
/** Runs before the timed ones: a server has long compiled what it does all day. */
const WARM_UP = 150;
const SPECIMEN_WARM_UP = 20;
/** A change of one parameter recomputes the specimen's half-line cells within this. */
const SPECIMEN_MS = 50;

/** The half-line solver: beside odex and beside SciPy in the same run, growth with n, and the cells of the specimen paper. */
export async function printSolvers(): Promise<void> {
  printRows("half-line solver, against odex", besideOdex());
  besideScipy();
  printGrowth();
  printSpecimen();
}

function trajectory(): Trajectory {
  const answer = solveTrajectory(MODEL);
  if ("refused" in answer) throw new Error(answer.refused);
  return answer;
}

/** Trajectory, s0 and the other constants, 1000 probabilities and the tail constant, from the model's numbers. */
function mainJob(): void {
  const t = trajectory();
  profileConstants(t);
  absorbedLaw(t, START, UP_TO);
  tailLaw(t, START, 1);
}

function besideOdex(): Row[] {
  const t = trajectory();
  const odex = timed(() => integrateTrajectory(MODEL.drift, MODEL.rate, MODEL.diffusion));
  return [
    { name: "odex: trajectory to both ends (s0, B0, slope), tolerance 1e-13", timing: odex },
    {
      name: "trajectory, s0, B0, slope with error bounds",
      timing: timed(trajectory, { warmUp: WARM_UP }),
      against: odex,
    },
    { name: "tail constant and corrections", timing: timed(() => tailLaw(t, START, 1)), against: odex },
  ];
}

function besideScipy(): void {
  const ours = timed(mainJob, { warmUp: WARM_UP });
  const peer = askPeer(MODEL.drift, START[0]?.position ?? 1, UP_TO);
  if (peer === null) {
    printRows("main job: trajectory, s0, 1000 probabilities, tail constant", [
      { name: "ours, with errors", timing: ours },
    ]);
    console.log(HOW_TO_GET);
    return;
  }
  printRows("main job: trajectory, s0, 1000 probabilities, tail constant", [
    { name: "SciPy: solve_ivp (DOP853), brentq, FFT; no errors; processor time", timing: peer.timing },
    { name: "ours, with errors", timing: ours, against: peer.timing, bound: 1 / FASTER },
  ]);
  console.log(`SciPy takes ${(peer.timing.median / ours.median).toFixed(1)} times as long (asked: ${FASTER}).`);
  printAccuracy(peer);
}

/** Relative errors of both against the references of the tests. */
function printAccuracy(peer: PeerAnswer): void {
  const entry = stored.entries.find(({ id }) => id === "away/binary/mu2");
  const reference = entry?.laws.find(({ x }) => x === START[0]?.position);
  if (entry === undefined || reference === undefined) throw new Error("The references have no such model.");
  const t = trajectory();
  const constants = profileConstants(t);
  const tail = tailLaw(t, START, 1);
  const law = absorbedLaw(t, START, UP_TO);
  if ("refused" in tail || "refused" in law) throw new Error("The main job was refused.");
  const value = (answer: Estimate | { refused: string }) => ("refused" in answer ? Number.NaN : answer.value);
  const line = (name: string, ours: number, theirs: number) =>
    console.log(`${name.padEnd(28)} ${ours.toExponential(1).padStart(10)} ${theirs.toExponential(1).padStart(10)}`);
  const constant = (name: string, ours: number, theirs: number, exact: string) => {
    const ln = lnOfDecimal(exact);
    line(name, relativeOf(lnOf(ours, 1, 0), ln), relativeOf(lnOf(theirs, 1, 0), ln));
  };
  console.log(`\n${"relative error".padEnd(28)} ${"ours".padStart(10)} ${"SciPy".padStart(10)}`);
  constant("s0", value(constants.s0), peer.s0, entry.s0);
  constant("amplitude", value(constants.amplitude), peer.amplitude, entry.amplitude);
  constant("slope at the barrier", value(constants.slopeAtBarrier), peer.slope, entry.slopeAtBarrier);
  constant("tail constant", tail.constant.value, peer.constant, reference.tailConstant);
  for (const [key, p] of Object.entries(reference.p)) {
    const n = Number(key);
    if (n > UP_TO || p === undefined) continue;
    const ln = lnOfDecimal(p);
    const ours = lnOf(law.mantissa[n] as number, 2, law.exponent[n] as number);
    line(`P(K = ${n})`, relativeOf(ours, ln), relativeOf(lnOf(peer.scaled[n] as number, peer.radius, -n), ln));
  }
}

function printGrowth(): void {
  const t = trajectory();
  const all = (n: number, warmUp = 0) => timed(() => absorbedLaw(t, START, n), { warmUp });
  const one = (n: number) => timed(() => absorbedProbability(t, START, n), { warmUp: WARM_UP });
  const thousand = all(1000, WARM_UP);
  const single = one(1000);
  printRows("growth with n, from a trajectory", [
    { name: "all p_n to 10^3", timing: thousand },
    { name: "all p_n to 10^4", timing: all(10_000, 10), against: thousand, bound: GROWTH },
    { name: "all p_n to 10^5", timing: all(100_000), against: thousand },
    { name: "p_n alone, n = 10^3", timing: single },
    { name: "p_n alone, n = 10^5", timing: one(100_000), against: single },
    { name: "p_n alone, n = 10^6", timing: one(1_000_000), against: single },
  ]);
  const widest = [1000, 10_000, 100_000].map((n) => {
    const p = absorbedProbability(t, START, n);
    return "refused" in p ? "refused" : `${relativeError(p).toExponential(1)} at n = ${n}`;
  });
  console.log(`Their own errors, relative: ${widest.join(", ")}.`);
}

function relativeError({ mantissa, error }: ScaledEstimate): number {
  return error / Math.abs(mantissa);
}

/** Kinds that read the half-line solver and nothing that simulates or searches. */
const HALF_LINE = [
  "parameters",
  "process",
  "profile",
  "counts",
  "yaglom",
  "tail",
  "formula",
  "table",
  "generating_function",
];

function printSpecimen(): void {
  const paper = readPaper(readFileSync(resolve(import.meta.dirname, "../db/specimen/paper.md"), "utf8"), "");
  const compute = (drift: number) => computeHalfLine(planPaper(paper, { overrides: { mu: String(drift) } }));
  const begun = performance.now();
  const count = compute(1.6);
  const first = performance.now() - begun;
  let turn = 0;
  // a drift never met before each time, as a dragged parameter gives it
  const changed = timed(
    () => {
      turn += 1;
      compute(1.5 + turn / 97);
    },
    { warmUp: SPECIMEN_WARM_UP },
  );
  printRows(`planning and computing the ${count} half-line cells of the specimen paper`, [
    { name: "first computation in this process", timing: { first, median: first, least: first } },
    { name: "after a change of one parameter", timing: changed },
  ]);
  console.log(
    `Asked: ${SPECIMEN_MS} ms of server time; ${changed.median > SPECIMEN_MS ? "missed" : "met"} by the median here.`,
  );
}

/** Computes every cell of these kinds whose needs are of these kinds too; how many there were. */
function computeHalfLine(plan: Plan): number {
  const ids = new Set<string>();
  for (const { id, kind, needs } of plan.cells)
    if (HALF_LINE.includes(kind) && needs.every((need) => ids.has(need))) ids.add(id);
  for (const [id, outcome] of computePlan(plan, { only: [...ids] }))
    if (outcome.status !== "computed") throw new Error(`${id} of the specimen is ${outcome.status}.`);
  return ids.size;
}
