import type { Formula } from "../../formulas/index.ts";
import { parsedFormula } from "../body.ts";

/** Which names of a formula are meant, and which hide them. */
export interface Meant {
  readonly name: string;
  /** The name is a parameter's, so that `setup.mu` may mean it. */
  readonly isParameter: boolean;
  /** Cells whose values of that name mean the parameter: those that declare it and those that vary it. */
  readonly owners: ReadonlySet<string>;
}

/**
 * Where a name stands in a formula's source, bound variables of that name left out.
 * @returns offsets within the source; none when the formula cannot be read
 */
export function namesInFormula(source: string, meant: Meant): number[] {
  const parsed = parsedFormula(source);
  return parsed.ok ? namesIn(parsed.formula, source, meant) : [];
}

function namesIn(formula: Formula, source: string, { name, isParameter, owners }: Meant): number[] {
  const found: number[] = [];
  const visit = (part: Formula, bound: ReadonlySet<string>): void => {
    if (part.node === "name" && part.name === name && !bound.has(name)) found.push(part.at);
    if (part.node === "member" || part.node === "call") {
      if (part.of === name && !isParameter) found.push(part.at);
      if (part.member === name && isParameter && owners.has(part.of)) found.push(memberAt(source, part.at, part.of));
    }
    if (part.node === "bind") visit(part.body, new Set(bound).add(part.variable));
    if ("args" in part) for (const arg of part.args) visit(arg, bound);
  };
  visit(formula, new Set());
  return found;
}

function memberAt(source: string, at: number, of: string): number {
  const between = /^\s*\.\s*/.exec(source.slice(at + of.length))?.[0] ?? ".";
  return at + of.length + between.length;
}
