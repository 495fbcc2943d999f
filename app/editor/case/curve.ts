import type { CellWords } from "../model/knowledge.ts";
import type { Asked } from "./asked.ts";
import type { CaseKnowledge } from "./types.ts";

/** A formula in one new name, and from where to where the name may go. */
export interface Curve {
  readonly formula: string;
  readonly dummy: string;
  readonly from: string;
  readonly to: string;
  /** As far as a table goes in steps of 1. */
  readonly few: string;
  /** What its column or curve is best called. */
  readonly column: string;
}

/** By the letter that the definitions use. */
const RANGES: Readonly<Record<string, readonly [from: string, to: string, few: string]>> = {
  n: ["1", "20", "5"],
  x: ["0", "4", "4"],
  i: ["1", "5", "5"],
  j: ["1", "3", "3"],
};
const ANY_RANGE: readonly [string, string, string] = ["0", "1", "1"];

/** What a formula may read with one argument, of the cells of a paper: the cell asked for, else the first law there is. */
export function curveWanted({ words }: Asked, knowledge: CaseKnowledge): Curve | null {
  const { cells } = knowledge.names;
  const asked = cells.filter(({ name }) => words.includes(name)).flatMap((cell) => curvesOf(cell, knowledge));
  const laws = cells.flatMap((cell) => curvesOf(cell, knowledge)).filter(({ own }) => own);
  const others = cells.flatMap((cell) => curvesOf(cell, knowledge)).filter(({ dummy }) => dummy.startsWith("x"));
  return asked[0] ?? laws[0] ?? others[0] ?? null;
}

function curvesOf(cell: CellWords, knowledge: CaseKnowledge): (Curve & { readonly own: boolean })[] {
  return cell.callables.flatMap(({ member, form }) => {
    const [, head = "", argument = ""] = /^([\w.]+)\((\w+)\)$/.exec(form) ?? [];
    if (argument === "") return [];
    const dummy = freeDummy(argument, knowledge);
    const [from, to, few] = RANGES[argument] ?? ANY_RANGE;
    const column = member === "" ? cell.kind : member;
    return [{ formula: `${head}(${dummy})`, dummy, from, to, few, column, own: member === "" }];
  });
}

/** A name that shadows no parameter and no cell; others may use it as theirs. */
export function freeDummy(letter: string, { names }: CaseKnowledge): string {
  const used = new Set([...names.parameters, ...names.cells].map(({ name }) => name));
  let dummy = letter;
  for (let count = 1; used.has(dummy); count += 1) dummy = `${letter}_${count}`;
  return dummy;
}
