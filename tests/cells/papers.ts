import type { CellResult, Outcome, Plan, PlannedCell } from "../../app/cells/index.ts";
import { computePlan, evaluateNumber, planPaper } from "../../app/cells/index.ts";
import type { Quantity, Value } from "../../app/formulas/index.ts";
import type { Paper } from "../../app/paper/index.ts";
import { readPaper } from "../../app/paper/index.ts";

/** The process of most tests: binary branching at rate 1, D = 1/2, drift mu. */
export const LARVAE = `\`\`\`parameters
beta: 1
mu: {value: 2, min: 1.45, max: 4, step: 0.05, symbol: \\mu, note: drift away from the barrier}
\`\`\`

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`
`;

/** In place of `rate: beta`: the mean number of children is 1, and a drift ≤ 0 leaves the cells that read the process without a trajectory. */
export const HALF_DIE = "rate: beta\noffspring: {0: 1/2, 2: 1/2}";

/** A fenced cell: `cell("counts K", "of: larvae", "start: 1")`. */
export function cell(info: string, ...lines: string[]): string {
  return `\n\`\`\`${info}\n${lines.join("\n")}\n\`\`\`\n`;
}

export interface ComputedPaper {
  readonly paper: Paper;
  readonly plan: Plan;
  readonly outcomes: ReadonlyMap<string, Outcome>;
  readonly results: ReadonlyMap<string, CellResult>;
}

export function planOf(text: string, overrides: Record<string, string> = {}): Plan {
  return planPaper(readPaper(text, ""), { overrides });
}

export function computed(text: string, overrides: Record<string, string> = {}): ComputedPaper {
  const paper = readPaper(text, "");
  const plan = planPaper(paper, { overrides });
  const outcomes = computePlan(plan);
  const results = new Map<string, CellResult>();
  for (const [id, outcome] of outcomes) if (outcome.status === "computed") results.set(id, outcome.result);
  return { paper, plan, outcomes, results };
}

/** What a formula gives in a computed paper: it is put at the end of the text as a bound number. */
export function valueIn(text: string, formula: string, overrides: Record<string, string> = {}): Value {
  const { paper, plan, results } = computed(`${text}\n\nHere :value[${formula}] stands.\n`, overrides);
  const number = paper.numbers.at(-1);
  if (number === undefined) throw new Error(`${formula} was not read as a number.`);
  return evaluateNumber(number, plan, results).value;
}

/** The quantity behind a value, or an error that says what it is instead. */
export function quantityOf(value: Value | undefined): Quantity {
  if (value?.type === "number") return value.quantity;
  throw new Error(`Not a number: ${JSON.stringify(value)}`);
}

export function reasonOf(value: Value | undefined): string {
  if (value?.type === "refused") return value.reason;
  throw new Error(`Not refused: ${JSON.stringify(value)}`);
}

export function plannedCell(plan: Plan, id: string): PlannedCell {
  const planned = plan.byId.get(id);
  if (planned === undefined) throw new Error(`There is no cell ${id} in ${[...plan.byId.keys()].join(", ")}.`);
  return planned;
}

export function keyOf(text: string, id: string, overrides: Record<string, string> = {}): string {
  const { key, failure } = plannedCell(planOf(text, overrides), id);
  if (key === null) throw new Error(`${id} has no key: ${failure?.message ?? "it waits"}`);
  return key;
}
