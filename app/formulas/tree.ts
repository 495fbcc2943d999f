import type { Formula } from "./types.ts";

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
