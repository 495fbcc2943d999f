import type { Formula, Quantity, Value } from "../formulas/index.ts";
import { canonicalJson, sha256 } from "./canonical.ts";
import type { Dependencies } from "./dependencies.ts";
import type { Draft } from "./drafts.ts";
import type { ParameterValues } from "./parameter-values.ts";

/** Enough to tell workings of one paper apart. */
const WORKING_DIGITS = 32;

/** How names and cells are written in a canonical form. */
interface Forms {
  name(name: string): unknown;
  cell(id: string): unknown;
}

/**
 * Keys of the cells of one paper. Layout of what is hashed, as canonical JSON:
 *
 *     { kind, solver, model }
 *
 * where `model` is the checked body with formulas as trees without offsets, parameters replaced by their values (a varied
 * parameter stays a name, and what is computed from it stays a formula), and cells replaced by their keys, taken likewise.
 * Source: the paper language, section on when a cell is out of date.
 */
export class Keys {
  readonly #known = new Map<string, string | null>();
  readonly #knownWorking = new Map<string, string>();

  constructor(
    readonly drafts: ReadonlyMap<string, Draft>,
    readonly dependencies: ReadonlyMap<string, Dependencies>,
    readonly parameters: ParameterValues,
  ) {}

  /** The key of a cell with some parameters left open; null when it, or a cell it reads, is at fault. */
  key(id: string, open: readonly string[] = []): string | null {
    const draft = this.drafts.get(id);
    const dependencies = this.dependencies.get(id);
    if (draft === undefined || draft.kind === null || dependencies === undefined || draft.faults.length > 0)
      return null;
    // Only parameters that the cell reads can make a difference.
    const openHere = open.filter((name) => dependencies.parameters.has(name));
    const known = this.#known.get(`${id} ${openHere.join(" ")}`);
    if (known !== undefined) return known;
    const key = this.#compute(draft, dependencies, openHere);
    this.#known.set(`${id} ${openHere.join(" ")}`, key);
    return key;
  }

  /**
   * Two hashes joined by a full stop: of the cell's own working with parameters and cells by name, and of the same with
   * the cells it reads by their own working keys. The first tells that the cell itself was changed, the second that
   * something it reads was.
   */
  workingKey(id: string): string {
    const known = this.#knownWorking.get(id);
    if (known !== undefined) return known;
    const draft = this.drafts.get(id);
    if (draft === undefined) return "";
    const byName: Forms = { name: (name) => ({ node: "name", name }), cell: (cell) => cell };
    const byWorking: Forms = { ...byName, cell: (cell) => this.workingKey(cell) };
    const hash = (forms: Forms): string =>
      sha256(canonicalJson([draft.cell.kind, formOf(draft.model, forms)])).slice(0, WORKING_DIGITS);
    const key = `${hash(byName)}.${hash(byWorking)}`;
    this.#knownWorking.set(id, key);
    return key;
  }

  #compute(draft: Draft, dependencies: Dependencies, open: readonly string[]): string | null {
    const inner = [...new Set([...open, ...dependencies.varied])];
    const keys = new Map([...dependencies.cells].map((cell) => [cell, this.key(cell, inner)]));
    if ([...keys.values()].includes(null)) return null;
    const forms: Forms = { name: (name) => this.#parameterForm(name, inner), cell: (cell) => keys.get(cell) ?? cell };
    const content = { kind: draft.cell.kind, solver: draft.kind?.solver, model: formOf(draft.model, forms) };
    return sha256(canonicalJson(content));
  }

  #parameterForm(name: string, open: readonly string[]): unknown {
    const reads = this.parameters.reads.get(name);
    const value = this.parameters.values.get(name);
    if (reads === undefined || value === undefined || open.includes(name)) return { node: "name", name };
    const formula = this.parameters.formulas.get(name);
    if (formula !== undefined && open.some((parameter) => reads.has(parameter))) {
      return formOf(formula, { name: (inner) => this.#parameterForm(inner, open), cell: (cell) => cell });
    }
    return valueForm(value);
  }
}

/** The canonical form of any part of a model: plain JSON in which formulas and references to cells are found by shape. */
function formOf(part: unknown, forms: Forms): unknown {
  if (Array.isArray(part)) return part.map((item) => formOf(item, forms));
  if (part === null || typeof part !== "object") return part;
  if (isFormula(part)) return formulaForm(part, forms, new Set());
  if (isReference(part)) return { cell: forms.cell(part.cell) };
  return Object.fromEntries(Object.entries(part).map(([key, member]) => [key, formOf(member, forms)]));
}

function formulaForm(formula: Formula, forms: Forms, bound: ReadonlySet<string>): unknown {
  const all = (args: readonly Formula[]): unknown[] => args.map((arg) => formulaForm(arg, forms, bound));
  switch (formula.node) {
    case "number":
    case "none":
      return formula;
    case "name":
      return bound.has(formula.name) ? { node: "name", name: formula.name } : forms.name(formula.name);
    case "member":
      return { node: "member", of: forms.cell(formula.of), member: formula.member };
    case "call":
      return { node: "call", of: forms.cell(formula.of), member: formula.member, args: all(formula.args) };
    case "apply":
      return { node: "apply", name: formula.name, args: all(formula.args) };
    case "bind": {
      const { binder, variable } = formula;
      const body = formulaForm(formula.body, forms, new Set(bound).add(variable));
      return { node: "bind", binder, variable, body, args: all(formula.args) };
    }
  }
}

function valueForm(value: Value): unknown {
  return value.type === "number" ? quantityForm(value.quantity) : { node: "none" };
}

function quantityForm({ mantissa, exponent, error, se }: Quantity): unknown {
  const isPlain = exponent === 0 && error === 0 && se === 0;
  return isPlain ? { node: "number", value: mantissa } : { node: "quantity", mantissa, exponent, error, se };
}

const NODES: ReadonlySet<string> = new Set(["number", "none", "name", "member", "apply", "call", "bind"]);

function isFormula(part: object): part is Formula {
  return "node" in part && typeof part.node === "string" && NODES.has(part.node);
}

function isReference(part: object): part is { readonly cell: string } {
  return "cell" in part && typeof part.cell === "string" && Object.keys(part).length === 1;
}
