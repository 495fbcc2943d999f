import type { Formula } from "../formulas/index.ts";
import type { Problem } from "../paper/index.ts";
import { nearestSpelling } from "../spelling/index.ts";
import type { Place } from "./body.ts";
import type { Members } from "./kind.ts";
import { didYouMean, listOfNames } from "./names.ts";

/** What the names of a paper mean, for checking formulas before anything is computed. */
export interface NameTable {
  readonly parameters: ReadonlySet<string>;
  /** Cells by name; members null where the cell's kind or body could not be read. */
  readonly cells: ReadonlyMap<string, NamedCell>;
}

export interface NamedCell {
  readonly kind: string;
  readonly members: Members | null;
  /** True for `parameters` cells: `setup.mu` is the parameter mu itself. */
  readonly isParameters: boolean;
}

/** What a formula reads. */
export interface Reads {
  readonly parameters: ReadonlySet<string>;
  readonly cells: ReadonlySet<string>;
}

/** A name that means nothing, or is used wrongly: `at` is its offset in the formula's source. */
export interface NameFault {
  readonly at: number;
  readonly length: number;
  readonly message: string;
  /** What was probably meant in place of those characters. */
  readonly meant: string | null;
}

/** Looks up every name of a formula; `locals` are dummies and earlier keys. */
export function lookUp(
  formula: Formula,
  locals: readonly string[],
  table: NameTable,
): { reads: Reads; faults: NameFault[] } {
  const parameters = new Set<string>();
  const cells = new Set<string>();
  const faults: NameFault[] = [];
  const fault = (at: number, length: number, message: string, meant: string | null = null): void => {
    faults.push({ at, length, message, meant });
  };

  const visitName = (name: string, at: number, bound: ReadonlySet<string>): void => {
    if (bound.has(name)) return;
    if (table.parameters.has(name)) parameters.add(name);
    else if (table.cells.has(name)) fault(at, name.length, cellAsNumber(name, table));
    else
      fault(at, name.length, unknownName(name, bound, table), nearestSpelling(name, [...bound, ...table.parameters]));
  };
  const visitMember = (of: string, member: string, at: number, args: number | null): void => {
    const message = memberFault(of, member, args, table);
    if (message !== null)
      fault(at, of.length, message, isKnown(of, table) ? null : nearestSpelling(of, table.cells.keys()));
    else if (table.cells.get(of)?.isParameters === true) parameters.add(member);
    else cells.add(of);
  };
  const visit = (part: Formula, bound: ReadonlySet<string>): void => {
    if (part.node === "name") visitName(part.name, part.at, bound);
    else if (part.node === "member") visitMember(part.of, part.member, part.at, null);
    else if (part.node === "call") visitMember(part.of, part.member, part.at, part.args.length);
    if (part.node === "bind") {
      if (table.parameters.has(part.variable) || table.cells.has(part.variable)) {
        const message = `\`${part.variable}\` is a name of this paper; the variable of \`${part.binder}\` must be a new one.`;
        fault(part.at, part.binder.length, message);
      }
      visit(part.body, new Set(bound).add(part.variable));
    }
    if ("args" in part) for (const arg of part.args) visit(arg, bound);
  };
  visit(formula, new Set(locals));
  return { reads: { parameters, cells }, faults };
}

/** The place of a fault in the paper, when the formula's characters stand there as they are. */
export function placeOfFault(fault: NameFault, place: Place, base: number | null): Place {
  if (base === null) return { from: place.from, to: place.to, line: place.line };
  const from = Math.min(base + fault.at, place.to);
  return { from, to: Math.min(from + fault.length, place.to), line: place.line };
}

/** A fix for a misspelt name whose characters stand in the paper as they are. */
export function fixOfFault(fault: NameFault, place: Place, base: number | null): Problem["fix"] {
  if (base === null || fault.meant === null) return undefined;
  const { from, to } = placeOfFault(fault, place, base);
  return { label: `Write ${fault.meant}`, from, to, insert: fault.meant };
}

function isKnown(name: string, table: NameTable): boolean {
  return table.cells.has(name) || table.parameters.has(name);
}

function cellAsNumber(name: string, table: NameTable): string {
  const cell = table.cells.get(name);
  const ways = waysToRead(name, cell?.members ?? null);
  return `\`${name}\` is a ${cell?.kind} cell, not a number. It gives ${ways === "" ? "no values" : ways}.`;
}

function unknownName(name: string, bound: ReadonlySet<string>, table: NameTable): string {
  const known = [...bound, ...table.parameters];
  return `\`${name}\` is not a parameter of this paper${bound.size > 0 ? ", nor a name given here" : ""}.${didYouMean(name, known)}`;
}

function memberFault(of: string, member: string, args: number | null, table: NameTable): string | null {
  const cell = table.cells.get(of);
  if (cell === undefined) {
    if (table.parameters.has(of)) return `\`${of}\` is a parameter: a number without values of its own.`;
    return `\`${of}\` is not a cell of this paper.${didYouMean(of, table.cells.keys())}`;
  }
  if (cell.members === null) return null;
  return args === null ? valueFault(of, member, cell, cell.members) : callFault(of, member, args, cell, cell.members);
}

function valueFault(of: string, member: string, cell: NamedCell, members: Members): string | null {
  if (members.values.includes(member)) return null;
  const callable = members.callables.find((candidate) => candidate.member === member);
  if (callable !== undefined) return `\`${of}.${member}\` needs an argument in brackets: \`${of}.${member}(1)\`.`;
  const names = [...members.values, ...members.callables.map((candidate) => candidate.member)];
  return `\`${member}\` is not a value of the ${cell.kind} cell \`${of}\`, which gives ${waysToRead(of, members) || "none"}.${didYouMean(member, names)}`;
}

function callFault(of: string, member: string, args: number, cell: NamedCell, members: Members): string | null {
  const written = member === "" ? of : `${of}.${member}`;
  const callable = members.callables.find((candidate) => candidate.member === member);
  if (callable === undefined) {
    if (members.values.includes(member)) return `\`${written}\` is a value; it is written without brackets.`;
    const names = [...members.values, ...members.callables.map((candidate) => candidate.member)];
    return `\`${written}\` cannot be called: the ${cell.kind} cell \`${of}\` gives ${waysToRead(of, members) || "no values"}.${didYouMean(member, names)}`;
  }
  if (args >= callable.least && args <= callable.most) return null;
  const range = callable.least === callable.most ? String(callable.least) : `${callable.least} or ${callable.most}`;
  return `\`${written}\` takes ${range} ${range === "1" ? "argument" : "arguments"}; here are ${args}.`;
}

/** `K.zero`, `K.mean`, `K(…)` and `K.above(…)`. */
function waysToRead(of: string, members: Members | null): string {
  if (members === null) return "";
  const values = members.values.map((value) => `${of}.${value}`);
  const calls = members.callables.map(({ member }) => (member === "" ? `${of}(…)` : `${of}.${member}(…)`));
  const ways = [...values, ...calls];
  return ways.length === 0 ? "" : listOfNames(ways);
}
