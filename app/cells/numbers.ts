import type { Formula, PrintedNumber, Scope, Value } from "../formulas/index.ts";
import { freeNames, printNumber } from "../formulas/index.ts";
import type { BoundNumber } from "../paper/index.ts";
import { parsedFormula } from "./body.ts";
import { evaluated } from "./context.ts";
import { listOfNames } from "./names.ts";
import { KINDS } from "./registry.ts";
import { scopeOver } from "./scope.ts";
import type { CellResult, Plan } from "./types.ts";
import { refusedValue } from "./values.ts";

/** What a number bound in the prose is. */
export interface EvaluatedNumber {
  readonly value: Value;
  /** null where there is nothing to print: see `problem`. */
  readonly printed: PrintedNumber | null;
  /** Ids of the cells it reads. */
  readonly needs: readonly string[];
  readonly parameters: readonly string[];
  /** Why there is no number. */
  readonly problem: string | null;
}

/** What names mean in a paper's formulas: its parameters as planned, its cells by the results at hand. */
export function paperScope(plan: Plan, results: ReadonlyMap<string, CellResult>): Scope {
  const parameters = new Map(plan.parameters.map((parameter) => [parameter.name, parameter.value]));
  const cells = scopeOver((name) => parameters.get(name), results);
  return {
    ...cells,
    // A parameter may be read through its cell, and is then the parameter itself.
    member: (of, member) => (isParametersCell(plan, of) ? parameters.get(member) : cells.member(of, member)),
  };
}

/** Evaluates and prints a number of the prose. Never throws: what cannot be printed has a problem in words. */
export function evaluateNumber(
  number: Pick<BoundNumber, "formula" | "options">,
  plan: Plan,
  results: ReadonlyMap<string, CellResult>,
): EvaluatedNumber {
  const parsed = parsedFormula(number.formula);
  if (!parsed.ok) return withoutNumber(refusedValue(parsed.problem.message), [], []);
  const free = namesRead(parsed.formula, plan);
  const missing = free.needs.filter((id) => !results.has(id));
  if (missing.length > 0) return withoutNumber(refusedValue(missingWords(missing, plan)), free.needs, free.parameters);
  const value = evaluated(parsed.formula, paperScope(plan, results));
  if (value.type === "text") return { value, printed: printedWords(value.text), ...free, problem: null };
  if (value.type === "truth" && value.holds !== null) {
    return { value, printed: printedWords(value.holds ? "holds" : "fails"), ...free, problem: null };
  }
  if (value.type !== "number") return withoutNumber(value, free.needs, free.parameters);
  const { withUnit, ...options } = number.options;
  const unit = withUnit === true ? unitOf(number.formula.trim(), plan) : "";
  return {
    value,
    printed: printNumber(value.quantity, unit === "" ? options : { ...options, unit }),
    ...free,
    problem: null,
  };
}

function withoutNumber(value: Value, needs: readonly string[], parameters: readonly string[]): EvaluatedNumber {
  const problem =
    value.type === "refused"
      ? value.reason
      : value.type === "truth"
        ? "Whether it holds is undecided within the errors."
        : "There is no value here.";
  return { value, printed: null, needs, parameters, problem };
}

/** The cells and parameters that a formula reads; parameters' cells count as the parameters themselves. */
function namesRead(formula: Formula, plan: Plan): { needs: readonly string[]; parameters: readonly string[] } {
  const free = freeNames(formula);
  const needs = new Set<string>();
  const parameters = new Set(free.names);
  for (const { of, member } of free.cells) {
    if (isParametersCell(plan, of)) parameters.add(member);
    else needs.add(of);
  }
  return {
    needs: [...needs],
    parameters: plan.parameters.map(({ name }) => name).filter((name) => parameters.has(name)),
  };
}

function isParametersCell(plan: Plan, id: string): boolean {
  const kind = plan.byId.get(id)?.kind;
  return kind !== undefined && KINDS.get(kind)?.knownAtPlanning === true;
}

function missingWords(missing: readonly string[], plan: Plan): string {
  const unknown = missing.filter((id) => !plan.byId.has(id));
  if (unknown.length > 0)
    return `${listOfNames(unknown)} ${unknown.length === 1 ? "is not a cell" : "are not cells"} of this paper.`;
  return `${listOfNames(missing)} ${missing.length === 1 ? "has no result" : "have no results"}.`;
}

/** A word such as "away" or "holds", printed like a number that has no digits in doubt. */
function printedWords(text: string): PrintedNumber {
  const tex = `\\text{${text}}`;
  return {
    text,
    tex,
    siunitx: tex,
    unsupported: "",
    supported: Number.POSITIVE_INFINITY,
    sheet: { known: text, unknown: "", rest: "" },
  };
}

/** The unit of a parameter quoted by its name; other formulas have none. */
function unitOf(formula: string, plan: Plan): string {
  return plan.parameters.find((parameter) => parameter.name === formula)?.unit ?? "";
}
