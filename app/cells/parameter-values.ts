import type { Formula, Quantity, Scope, Value } from "../formulas/index.ts";
import { exact, printExact, toDouble } from "../formulas/index.ts";
import type { Problem } from "../paper/index.ts";
import { parsedFormula } from "./body.ts";
import { evaluated } from "./context.ts";
import type { Declarations } from "./declared.ts";
import { faultAt } from "./declared.ts";
import { lookUp } from "./lookup.ts";
import { listOfNames } from "./names.ts";
import type { DeclaredParameter } from "./parameters/model.ts";
import type { PlannedParameter } from "./types.ts";
import { numberValue, refusedValue } from "./values.ts";

/** Parameters with their values, and what each reads of the others. */
export interface ParameterValues {
  readonly planned: readonly PlannedParameter[];
  readonly values: ReadonlyMap<string, Value>;
  /** Formula of each, overrides in place. */
  readonly formulas: ReadonlyMap<string, Formula>;
  /** Parameters that each reads, directly and through others. */
  readonly reads: ReadonlyMap<string, ReadonlySet<string>>;
  readonly scope: Scope;
  /** What is wrong with overrides, which stand nowhere in the text. */
  readonly problems: readonly Problem[];
}

const KNOWN_NOWHERE: Pick<Scope, "member" | "call"> = { member: () => undefined, call: () => undefined };

/** Evaluates all parameters, each after those it reads. A circle is a fault of each cell on it. */
export function evaluateParameters(names: Declarations, overrides: Readonly<Record<string, string>>): ParameterValues {
  const problems: Problem[] = [];
  const formulas = parameterFormulas(names, overrides, problems);
  const values = new Map<string, Value>();
  const reads = new Map<string, Set<string>>();
  const scope: Scope = { name: (name) => values.get(name), ...KNOWN_NOWHERE };

  const settle = (name: string, path: readonly string[]): void => {
    const entry = names.declared.get(name);
    const formula = formulas.get(name);
    if (values.has(name) || entry === undefined) return;
    if (path.includes(name)) {
      refuseCircle(names, path.slice(path.indexOf(name)), values);
      return;
    }
    const direct = formula === undefined ? new Set<string>() : lookUp(formula, [], names).reads.parameters;
    const all = new Set<string>();
    for (const read of direct) {
      settle(read, [...path, name]);
      for (const through of [read, ...(reads.get(read) ?? [])]) all.add(through);
    }
    reads.set(name, all);
    if (!values.has(name)) values.set(name, parameterValue(formula, entry.parameter, scope));
  };
  for (const name of names.declared.keys()) settle(name, []);

  const planned = [...names.declared].map(([name, { parameter }]) => {
    const overridden = Object.hasOwn(overrides, name);
    const shown = plannedParameter(parameter, values.get(name) ?? refusedValue("It has no value."), scope, overridden);
    return { ...shown, formula: formulas.get(name) ?? null, reads: [...(reads.get(name) ?? [])] };
  });
  for (const parameter of planned) problems.push(...rangeProblems(parameter, names));
  return { planned, values, formulas, reads, scope, problems };
}

/** A parameter's value as a cause or provenance line prints it: as typed where it was typed as a number. */
export function parameterWords(parameter: PlannedParameter): string {
  const source = parameter.source.trim();
  if (!parameter.overridden && /^[-+]?(\d+\.?\d*|\.\d+)$/.test(source)) return source;
  return parameter.value.type === "number" ? printExact(toDouble(parameter.value.quantity)) : "no value";
}

/** Formulas that can be evaluated: those of faulty entries are left out, so that nothing computes with a stand-in. */
function parameterFormulas(
  names: Declarations,
  overrides: Readonly<Record<string, string>>,
  problems: Problem[],
): Map<string, Formula> {
  const formulas = new Map<string, Formula>();
  for (const [name, { parameter, draft }] of names.declared) {
    const faulty = draft.faults.some((fault) => fault.from >= parameter.from && fault.to <= parameter.to);
    if (!faulty) formulas.set(name, parameter.value);
  }
  for (const [name, source] of Object.entries(overrides)) {
    const entry = names.declared.get(name);
    const parsed = parsedFormula(source);
    const fault = parsed.ok ? lookUp(parsed.formula, [], names).faults[0]?.message : parsed.problem.message;
    if (entry === undefined)
      problems.push(
        overrideProblem(`\`${name}\` is not a parameter of this paper; it has ${listOfNames(names.parameters)}.`, 0, 1),
      );
    else if (parsed.ok && fault === undefined) formulas.set(name, parsed.formula);
    else
      problems.push(
        overrideProblem(
          `\`${name}\` cannot be set to “${source}”: ${fault}`,
          entry.parameter.from,
          entry.parameter.line,
        ),
      );
  }
  return formulas;
}

function overrideProblem(message: string, at: number, line: number): Problem {
  return { from: at, to: at, line, severity: "error", message };
}

/** Parameters are inputs: whatever rounding their formulas had, they stand as exact numbers. */
function parameterValue(formula: Formula | undefined, parameter: DeclaredParameter, scope: Scope): Value {
  if (formula === undefined)
    return refusedValue(`The parameter \`${parameter.name}\` could not be read; see line ${parameter.line}.`);
  const value = evaluated(formula, scope);
  if (value.type === "refused")
    return refusedValue(`The parameter \`${parameter.name}\` has no value (line ${parameter.line}): ${value.reason}`);
  if (value.type !== "number")
    return refusedValue(`The parameter \`${parameter.name}\` is not a number (line ${parameter.line}).`);
  const x = toDouble(value.quantity);
  if (!Number.isFinite(x))
    return refusedValue(`The parameter \`${parameter.name}\` is beyond the range of numbers (line ${parameter.line}).`);
  const se = evaluated(parameter.se, scope);
  const standardError = se.type === "number" ? Math.abs(toDouble(se.quantity)) : 0;
  const quantity: Quantity = exact(x);
  return numberValue(standardError === 0 ? quantity : { ...quantity, se: standardError });
}

function refuseCircle(names: Declarations, circle: readonly string[], values: Map<string, Value>): void {
  const message =
    circle.length === 1
      ? `\`${circle[0]}\` reads itself. A parameter needs a value of its own.`
      : `${listOfNames(circle)} need each other. One of them must stand without the others.`;
  for (const name of circle) {
    const entry = names.declared.get(name);
    values.set(name, refusedValue(message));
    if (entry !== undefined) entry.draft.faults.push(faultAt(entry.draft, entry.parameter, message));
  }
}

function plannedParameter(
  parameter: DeclaredParameter,
  value: Value,
  scope: Scope,
  overridden: boolean,
): Omit<PlannedParameter, "formula" | "reads"> {
  const { name, source, from, to, line, symbol, unit, note } = parameter;
  const number = (formula: Formula | null): number | null => {
    const end = formula === null ? null : evaluated(formula, scope);
    return end?.type === "number" ? toDouble(end.quantity) : null;
  };
  const [min, max, step] = [number(parameter.min), number(parameter.max), number(parameter.step)];
  return { name, source, from, to, line, value, min, max, step, symbol, unit, note, overridden };
}

/** A scale that runs backwards, a value off its scale: said, but the parameter keeps its value. */
function rangeProblems(parameter: PlannedParameter, names: Declarations): Problem[] {
  const draft = names.declared.get(parameter.name)?.draft;
  const { min, max, step, value, from, to, line, name } = parameter;
  const warn = (message: string): Problem[] => [{ from, to, line, severity: "warning", message, cell: draft?.cell.id }];
  if (min !== null && max !== null && min >= max)
    return warn(
      `The scale of \`${name}\` goes from ${printExact(min)} to ${printExact(max)}; \`min\` must be below \`max\`.`,
    );
  if (step !== null && step <= 0) return warn(`\`step\` of \`${name}\` is ${printExact(step)}; it must be above 0.`);
  if (value.type !== "number") return [];
  const x = toDouble(value.quantity);
  if (min !== null && x < min) return warn(`\`${name}\` is ${printExact(x)}, below its \`min\`, ${printExact(min)}.`);
  if (max !== null && x > max) return warn(`\`${name}\` is ${printExact(x)}, above its \`max\`, ${printExact(max)}.`);
  return [];
}
