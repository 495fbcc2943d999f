import type { Formula, Quantity } from "./types.ts";

/** What a formula reads from outside itself. */
export interface FreeNames {
  /** Parameters, dummies, earlier keys, in order of first appearance. */
  readonly names: readonly string[];
  /** Values and callables of cells; member is "" where the cell itself is called. */
  readonly cells: readonly CellUse[];
}

export interface CellUse {
  readonly of: string;
  readonly member: string;
  readonly called: boolean;
}

/** Lists what a formula reads, each once, without the variables that its own sums and integrals bind. */
export function freeNames(formula: Formula): FreeNames {
  const names = new Set<string>();
  const cells = new Map<string, CellUse>();
  const use = (of: string, member: string, called: boolean): void => {
    cells.set(`${of}.${member}.${called}`, { of, member, called });
  };
  const visit = (part: Formula, bound: ReadonlySet<string>): void => {
    switch (part.node) {
      case "name":
        if (!bound.has(part.name)) names.add(part.name);
        return;
      case "member":
        use(part.of, part.member, false);
        return;
      case "call":
        use(part.of, part.member, true);
        for (const arg of part.args) visit(arg, bound);
        return;
      case "apply":
        for (const arg of part.args) visit(arg, bound);
        return;
      case "bind":
        visit(part.body, new Set(bound).add(part.variable));
        for (const arg of part.args) visit(arg, bound);
    }
  };
  visit(formula, new Set());
  return { names: [...names], cells: [...cells.values()] };
}

/** The variables that sums, integrals, derivatives and searches within the formula bind. */
export function boundNames(formula: Formula): readonly string[] {
  switch (formula.node) {
    case "bind":
      return [formula.variable, ...boundNames(formula.body), ...formula.args.flatMap(boundNames)];
    case "apply":
    case "call":
      return formula.args.flatMap(boundNames);
    default:
      return [];
  }
}

/** A formula in canonical form: offsets left out, known names replaced by their values. JSON, made to be hashed. */
export type CanonicalFormula =
  | { readonly node: "number"; readonly value: number }
  | {
      readonly node: "quantity";
      readonly mantissa: number;
      readonly exponent: number;
      readonly error: number;
      readonly se: number;
    }
  | { readonly node: "none" }
  | { readonly node: "name"; readonly name: string }
  | { readonly node: "member"; readonly of: string; readonly member: string }
  | { readonly node: "apply"; readonly name: string; readonly args: readonly CanonicalFormula[] }
  | { readonly node: "call"; readonly of: string; readonly member: string; readonly args: readonly CanonicalFormula[] }
  | {
      readonly node: "bind";
      readonly binder: string;
      readonly body: CanonicalFormula;
      readonly variable: string;
      readonly args: readonly CanonicalFormula[];
    };

/**
 * The canonical form of a formula, for keys: spaces, brackets that change nothing and offsets do not enter, and each
 * name in `values` is replaced by its number (bound variables are left alone).
 */
export function substitute(formula: Formula, values: Readonly<Record<string, Quantity>>): CanonicalFormula {
  const all = (args: readonly Formula[]): CanonicalFormula[] => args.map((arg) => substitute(arg, values));
  switch (formula.node) {
    case "number":
    case "none":
      return formula;
    case "name": {
      const value = Object.hasOwn(values, formula.name) ? values[formula.name] : undefined;
      return value === undefined ? { node: "name", name: formula.name } : numberNode(value);
    }
    case "member":
      return { node: "member", of: formula.of, member: formula.member };
    case "call":
      return { node: "call", of: formula.of, member: formula.member, args: all(formula.args) };
    case "apply":
      return { node: "apply", name: formula.name, args: all(formula.args) };
    case "bind": {
      const { [formula.variable]: _shadowed, ...outer } = values;
      const { binder, variable } = formula;
      return { node: "bind", binder, body: substitute(formula.body, outer), variable, args: all(formula.args) };
    }
  }
}

function numberNode({ mantissa, exponent, error, se }: Quantity): CanonicalFormula {
  if (exponent === 0 && error === 0 && se === 0) return { node: "number", value: mantissa };
  return { node: "quantity", mantissa, exponent, error, se };
}
