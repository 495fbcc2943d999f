import type { Formula, Quantity, Scope, Value } from "../formulas/index.ts";
import { compileFormula, FormulaError, newBudget, toDouble } from "../formulas/index.ts";
import type { CellReference } from "./body.ts";
import type { Branch } from "./kind.ts";
import type { CellResult } from "./types.ts";

/** A cell that cannot compute: which entry of its body is at fault, and what would do. */
export class CellFault extends Error {
  readonly path: string;

  constructor(path: string, message: string) {
    super(message);
    this.name = "CellFault";
    this.path = path;
  }
}

/** Thrown while planning where an input depends on a result that is still to be computed. */
export class NotKnownYet extends Error {}

/** What an input must be. Ends belong to the range unless `above` excludes the lower one. */
export interface Limits {
  readonly least?: number;
  readonly above?: number;
  readonly most?: number;
  readonly whole?: boolean;
}

/** A cell read by another: its result, or why there is none (for a value of a varied parameter). */
export type ReadCell = CellResult | { readonly refused: string };

/** What a context is made of; see compute.ts. */
export interface ContextParts {
  readonly scope: Scope;
  readonly results: ReadonlyMap<string, ReadCell>;
  readonly progress: (done: number, total: number) => void;
  readonly varied: readonly string[];
  readonly recomputedCells: number;
  readonly with: (values: Readonly<Record<string, Quantity>>) => ComputeContext;
  readonly branches: (values: Readonly<Record<string, Quantity>>) => ReadonlyMap<string, Branch>;
}

/** What a computation may look at: parameters, results of the cells it reads, and a way to tell how far it is. */
export class ComputeContext {
  /** Parameters that the cell varies. */
  readonly varied: readonly string[];
  /** How many cells `with` computes again each time. */
  readonly recomputedCells: number;
  readonly #parts: ContextParts;

  constructor(parts: ContextParts) {
    this.#parts = parts;
    this.varied = parts.varied;
    this.recomputedCells = parts.recomputedCells;
  }

  /** Tells how far the computation is. */
  progress(done: number, total: number): void {
    this.#parts.progress(done, total);
  }

  /** The same context with varied parameters set, and everything that reads them computed again. */
  with(values: Readonly<Record<string, Quantity>>): ComputeContext {
    return this.#parts.with(values);
  }

  /** The branches, cell by cell, of what `with` would compute again; found at once, nothing is computed. */
  branches(values: Readonly<Record<string, Quantity>>): ReadonlyMap<string, Branch> {
    return this.#parts.branches(values);
  }

  /** Result of a cell named in the body. @throws CellFault when it has none. */
  result(reference: CellReference, path: string): CellResult {
    const found = this.#parts.results.get(reference.cell);
    if (found === undefined) throw new CellFault(path, `\`${reference.cell}\` has no result.`);
    if ("refused" in found) throw new CellFault(path, found.refused);
    return found;
  }

  /** What a formula gives, dummies and earlier keys standing in `locals`. Never throws. */
  value(formula: Formula, locals: Readonly<Record<string, Value>> = {}): Value {
    return evaluated(formula, withLocals(this.#parts.scope, locals));
  }

  /** A number within limits, for a solver: its error is left behind, since results' errors are for the inputs as given. */
  number(formula: Formula, path: string, limits: Limits, locals: Readonly<Record<string, Value>> = {}): number {
    const value = this.value(formula, locals);
    const name = `\`${path.replace(/\.\d+$/, "")}\``;
    if (value.type === "refused") throw new CellFault(path, `${name} has no value: ${value.reason}`);
    if (value.type !== "number")
      throw new CellFault(path, `${name} is not a number; it must be ${limitWords(limits)}.`);
    const x = toDouble(value.quantity);
    const wholeEnough = limits.whole !== true || Number.isInteger(x);
    if (Number.isFinite(x) && wholeEnough && withinLimits(x, limits)) return x;
    throw new CellFault(path, `${name} is ${String(x)}; it must be ${limitWords(limits)}.`);
  }
}

/** `locals` before what the scope knows. */
function withLocals(scope: Scope, locals: Readonly<Record<string, Value>>): Scope {
  return {
    name: (name) => (Object.hasOwn(locals, name) ? locals[name] : scope.name(name)),
    member: (of, member) => scope.member(of, member),
    call: (of, member, args) => scope.call(of, member, args),
  };
}

/** A formula's value; what the formula itself cannot do (a budget used up) is a refusal. */
export function evaluated(formula: Formula, scope: Scope): Value {
  try {
    return compiled(formula)(scope, newBudget());
  } catch (error) {
    if (error instanceof FormulaError) return { type: "refused", reason: error.message };
    throw error;
  }
}

const compiledFormulas = new WeakMap<Formula, ReturnType<typeof compileFormula>>();

/** Compiled once for each tree: rows of a table and positions of a curve evaluate the same one again and again. */
function compiled(formula: Formula): ReturnType<typeof compileFormula> {
  const known = compiledFormulas.get(formula);
  if (known !== undefined) return known;
  const made = compileFormula(formula);
  compiledFormulas.set(formula, made);
  return made;
}

function withinLimits(x: number, { least, above, most }: Limits): boolean {
  return (least === undefined || x >= least) && (above === undefined || x > above) && (most === undefined || x <= most);
}

/** "a whole number from 1 to 100000", "a number above 0". */
function limitWords({ least, above, most, whole }: Limits): string {
  const noun = whole === true ? "a whole number" : "a number";
  if (least !== undefined && most !== undefined) return `${noun} from ${least} to ${most}`;
  const words: string[] = [];
  if (least !== undefined) words.push(`not below ${least}`);
  if (above !== undefined) words.push(`above ${above}`);
  if (most !== undefined) words.push(`not above ${most}`);
  return [noun, words.join(" and ")].filter((part) => part !== "").join(" ");
}
