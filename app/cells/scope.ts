import type { Quantity, Scope, Value } from "../formulas/index.ts";
import { SolverError } from "../solvers/index.ts";
import type { ReadCell } from "./context.ts";
import { KINDS } from "./registry.ts";
import type { CellResult } from "./types.ts";

/** Calls whose values a computation keeps at hand: those of a search over some hundred terms. */
const CALLS_REMEMBERED = 4096;

/** A scope over parameters and results; a cell that has no result but a reason gives that reason. */
export function scopeOver(
  parameters: (name: string) => Value | undefined,
  results: ReadonlyMap<string, ReadCell>,
): Scope {
  // A sum within a search asks for the same values again and again.
  const calls = new Map<string, Value>();
  const result = (of: string): CellResult | Value | undefined => {
    const found = results.get(of);
    return found !== undefined && "refused" in found ? { type: "refused", reason: found.refused } : found;
  };
  return {
    name: parameters,
    member(of, member) {
      const found = result(of);
      if (found === undefined || "type" in found) return found;
      return Object.hasOwn(found.values, member) ? found.values[member] : undefined;
    },
    call(of, member, args) {
      const found = result(of);
      if (found === undefined || "type" in found) return found;
      const name = callName(of, member, args);
      const known = name === null ? undefined : calls.get(name);
      if (known !== undefined) return known;
      const value = called(found, member, args);
      if (value !== undefined && name !== null && calls.size < CALLS_REMEMBERED) calls.set(name, value);
      return value;
    },
  };
}

/** A call by which it is known again; null where its arguments have errors. */
function callName(of: string, member: string, args: readonly Quantity[]): string | null {
  let name = `${of}.${member}`;
  for (const { mantissa, exponent, error, se } of args) {
    if (error !== 0 || se !== 0) return null;
    name += `,${mantissa}p${exponent}`;
  }
  return name;
}

/** What a callable gives; arguments that the solver cannot take are refused in its words. */
function called(result: CellResult, member: string, args: readonly Quantity[]): Value | undefined {
  try {
    return KINDS.get(result.kind)?.call(result.data, member, args);
  } catch (error) {
    if (error instanceof SolverError) return { type: "refused", reason: error.message };
    throw error;
  }
}
