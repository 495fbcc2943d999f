import { type CellResult, computePlan, evaluateNumber, planPaper } from "../app/cells/index.ts";
import { readPaper } from "../app/paper/index.ts";
import { generatePaper } from "./paper-generator.ts";
import { printRows, type Row } from "./table.ts";
import { timed } from "./timing.ts";

const PAPER_BYTES = 200_000;
const PAPER_CELLS = 60;
const SEED = 20_261_201;
/** Papers of other seeds, since what was read once is remembered. */
const UNSEEN = 5;

/** The long paper that papers and keystrokes are timed with. */
export function longPaper(): string {
  return generatePaper(PAPER_BYTES, PAPER_CELLS, SEED);
}

/** A long paper without a browser: reading, planning, a keystroke, computing, printing of numbers. */
export async function printPapers(): Promise<void> {
  printRows("a long paper", paperRows());
}

function paperRows(): Row[] {
  const text = longPaper();
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
