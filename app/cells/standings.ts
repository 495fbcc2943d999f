import type { Quantity, Value } from "../formulas/index.ts";
import { exact, toDouble } from "../formulas/index.ts";
import type { Branches } from "./borders.ts";
import { branchAt, planningContext } from "./compute.ts";
import { CellFault, evaluated, NotKnownYet } from "./context.ts";
import type { Branch } from "./kind.ts";
import { KINDS } from "./registry.ts";
import type { CellResult, Plan, PlannedCell } from "./types.ts";
import { numberValue } from "./values.ts";

const REFUSED = "refused ";

/** Whether a standing is an input refused. */
export function isRefusal({ name }: Branch): boolean {
  return name.startsWith(REFUSED);
}

/** Whether planning can tell anything of a cell for other values: it has branches, or its own formulas read the parameter. */
export function isJudged({ task }: PlannedCell, plan: Plan, name: string): boolean {
  if (task === null) return false;
  if (KINDS.get(task.kind)?.branch !== undefined) return true;
  const moving = new Set(
    plan.parameters.flatMap((each) => (each.reads.includes(name) ? [each.name] : [])).concat(name),
  );
  return mentions(task.model, moving);
}

/** Whether any formula of a model reads one of some names. */
function mentions(part: unknown, names: ReadonlySet<string>): boolean {
  if (part === null || typeof part !== "object") return false;
  if ("node" in part && part.node === "name" && "name" in part && typeof part.name === "string")
    return names.has(part.name);
  return Object.values(part).some((inner) => mentions(inner, names));
}

/** How each reader stands at a value of the parameter: the branch of its theory, or that its input is refused. */
export function standingsAt(
  plan: Plan,
  name: string,
  x: number,
  readers: readonly PlannedCell[],
  known: (key: string) => CellResult | undefined = () => undefined,
): Branches {
  const parameters = parametersAt(plan, name, x);
  const results = new Map<string, CellResult>();
  for (const cell of plan.cells) {
    const result = cell.key === null || cell.parameters.includes(name) ? undefined : known(cell.key);
    if (result !== undefined) results.set(cell.id, result);
  }
  const standings = new Map<string, Branch>();
  for (const { id, task } of readers) {
    if (task === null) continue;
    const here = { ...task, parameters: onlyOf(Object.keys(task.parameters), parameters) };
    const fault = faultOf(here);
    const branch = fault ?? branchAt(here, here.parameters, results);
    if (branch !== null) standings.set(id, branch);
  }
  return standings;
}

/** The parameters with one of them set, and those computed from it evaluated again; one without a value is left out. */
function parametersAt(plan: Plan, name: string, x: number): ReadonlyMap<string, Quantity> {
  const values = new Map<string, Value>(plan.parameters.map((parameter) => [parameter.name, parameter.value]));
  values.set(name, numberValue(exact(x)));
  const scope = { name: (read: string) => values.get(read), member: () => undefined, call: () => undefined };
  const dependent = plan.parameters.filter(({ reads, formula }) => formula !== null && reads.includes(name));
  for (const { name: other, formula } of [...dependent].sort((a, b) => a.reads.length - b.reads.length)) {
    const value = formula === null ? undefined : evaluated(formula, scope);
    if (value !== undefined)
      values.set(other, value.type === "number" ? numberValue(exact(toDouble(value.quantity))) : value);
  }
  return new Map([...values].flatMap(([read, value]) => (value.type === "number" ? [[read, value.quantity]] : [])));
}

function onlyOf(names: readonly string[], parameters: ReadonlyMap<string, Quantity>): Record<string, Quantity> {
  const found: Record<string, Quantity> = {};
  for (const name of names) {
    const quantity = parameters.get(name);
    if (quantity !== undefined) found[name] = quantity;
  }
  return found;
}

/** An input that is refused is a branch of its own, in which the cell has no answer. */
function faultOf(task: NonNullable<PlannedCell["task"]>): Branch | null {
  try {
    KINDS.get(task.kind)?.inspect(task.model, planningContext(task));
    return null;
  } catch (error) {
    if (error instanceof NotKnownYet) return null;
    if (!(error instanceof CellFault)) throw error;
    return { name: `${REFUSED}${error.path}`, holds: error.message, borders: [], closed: false };
  }
}
