/**
 * Times the parts of the program that a reader waits for, and the main job's solves beside a general integrator in the
 * same run, so that the ratio does not depend on the machine; then a keystroke in a long paper beside one in the bare
 * editing component, in Chromium: npm run bench [-- keystroke], which leaves out all but the last.
 */
import { type CellResult, computePlan, evaluateNumber, planPaper } from "../app/cells/index.ts";
import { readPaper } from "../app/paper/index.ts";
import {
  absorbedLaw,
  absorbedProbability,
  type ProcessModel,
  profileConstants,
  solveTrajectory,
  type Trajectory,
  tailLaw,
} from "../app/solvers/index.ts";
import { printKeystrokes } from "./keystroke.ts";
import { integrateTrajectory } from "./odex-trajectory.ts";
import { generatePaper } from "./paper-generator.ts";
import { type Timing, timed } from "./timing.ts";

const PAPER_BYTES = 200_000;
const PAPER_CELLS = 60;
const SEED = 20_261_201;
const UP_TO = 1000;
/** Papers of other seeds, since what was read once is remembered. */
const UNSEEN = 5;

const MODEL: ProcessModel = {
  drift: 2,
  rate: 1,
  diffusion: 0.5,
  offspring: { law: "finite", probabilities: [0, 0, 1] },
};
const START = [{ position: 1, particles: 1 }];

function trajectory(): Trajectory {
  const answer = solveTrajectory(MODEL);
  if ("refused" in answer) throw new Error(answer.refused);
  return answer;
}

function mainJob(): void {
  const t = trajectory();
  profileConstants(t);
  absorbedLaw(t, START, UP_TO);
  tailLaw(t, START, 1);
}

interface Row {
  readonly name: string;
  readonly timing: Timing;
  /** The row it is measured against. */
  readonly against?: Timing;
}

function solverRows(): Row[] {
  const t = trajectory();
  const odex = timed(() => integrateTrajectory(MODEL.drift, MODEL.rate, MODEL.diffusion));
  return [
    { name: "odex: trajectory to both ends (s0, B0, slope), tolerance 1e-13", timing: odex },
    { name: "trajectory, s0, B0, slope with error bounds", timing: timed(trajectory), against: odex },
    {
      name: `probabilities to n = ${UP_TO} from a trajectory`,
      timing: timed(() => absorbedLaw(t, START, UP_TO)),
      against: odex,
    },
    { name: "one probability, n = 10000", timing: timed(() => absorbedProbability(t, START, 10_000)), against: odex },
    { name: "tail constant and corrections", timing: timed(() => tailLaw(t, START, 1)), against: odex },
    { name: "main job: all of these together", timing: timed(mainJob), against: odex },
  ];
}

function paperRows(): Row[] {
  const text = generatePaper(PAPER_BYTES, PAPER_CELLS, SEED);
  const paper = readPaper(text, "");
  const plan = planPaper(paper);
  const results = new Map<string, CellResult>();
  const problems = [...paper.problems, ...plan.problems];
  if (problems.length > 0) throw new Error(`The paper of the bench has a problem: ${problems[0]?.message}`);
  const compute = timed(() => {
    for (const [id, outcome] of computePlan(plan)) {
      if (outcome.status !== "computed") throw new Error(`${id} is ${outcome.status}`);
      results.set(id, outcome.result);
    }
  });
  // A letter typed into a paragraph near the middle: what a keystroke costs.
  let typed = 0;
  const middle = text.indexOf("\n\nThe ", text.length / 2) + 6;
  const keystroke = (): void => {
    typed += 1;
    planPaper(readPaper(`${text.slice(0, middle)}${"a".repeat(typed)} ${text.slice(middle)}`, ""));
  };
  const unseen = Array.from({ length: UNSEEN }, (_, i) => generatePaper(PAPER_BYTES, PAPER_CELLS, SEED + 1 + i));
  const size = `${Math.round(text.length / 1000)} kB, ${paper.cells.length} cells, ${paper.numbers.length} numbers`;
  return [
    {
      name: `reading a paper never seen before (${size})`,
      timing: timed(() => readPaper(unseen.shift() ?? "", ""), { runs: UNSEEN }),
    },
    { name: "planning it", timing: timed(() => planPaper(paper)) },
    { name: "reading and planning after a keystroke", timing: timed(keystroke) },
    { name: "computing all its cells", timing: compute },
    {
      name: "evaluating and printing its numbers",
      timing: timed(() => paper.numbers.map((number) => evaluateNumber(number, plan, results))),
    },
  ];
}

function agreement(): string {
  const ours = profileConstants(trajectory());
  const theirs = integrateTrajectory(MODEL.drift, MODEL.rate, MODEL.diffusion);
  const relative = (a: unknown, b: number): string => {
    const value =
      typeof a === "object" && a !== null && "value" in a && typeof a.value === "number" ? a.value : Number.NaN;
    return Math.abs(value / b - 1).toExponential(1);
  };
  return `They agree: s0 to ${relative(ours.s0, theirs.s0)}, B0 to ${relative(ours.amplitude, theirs.amplitude)}, slope to ${relative(ours.slopeAtBarrier, theirs.slopeAtBarrier)}.`;
}

function print(rows: readonly Row[]): void {
  const width = Math.max(...rows.map(({ name }) => name.length));
  console.log(`${"".padEnd(width)}   first ms  median ms   least ms  median/odex`);
  for (const { name, timing, against } of rows) {
    const columns = [timing.first, timing.median, timing.least].map((ms) => ms.toFixed(2).padStart(10));
    const ratio = against === undefined ? "" : (timing.median / against.median).toFixed(3).padStart(12);
    console.log(`${name.padEnd(width)} ${columns.join(" ")} ${ratio}`);
  }
}

if (process.argv[2] !== "keystroke") {
  print([...solverRows(), ...paperRows()]);
  console.log(`\n${agreement()}`);
}
await printKeystrokes(generatePaper(PAPER_BYTES, PAPER_CELLS, SEED));
