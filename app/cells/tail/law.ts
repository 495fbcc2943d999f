import type { Quantity, Value } from "../../formulas/index.ts";
import { approximate, toDouble } from "../../formulas/index.ts";
import type { TailLaw } from "../../solvers/index.ts";
import { tailProbability } from "../../solvers/index.ts";
import { numberValue, refusedValue, scaledValue } from "../values.ts";
import type { Comparison } from "./model.ts";

/** The asymptotic law at n. */
export function tailValue(law: TailLaw, argument: Quantity): Value {
  const n = toDouble(argument);
  if (Number.isInteger(n) && n >= 1) return scaledValue(tailProbability(law, n).probability);
  return refusedValue(`The asymptotic law is one for n = 1, 2, …; ${n} is none of them.`);
}

/** Exact over asymptotic: relative errors add. */
export function ratioOf({ n, exact, law }: Comparison, missing: string | null): Value {
  if (exact === null) return refusedValue(missing ?? `No probability was computed at n = ${n}.`);
  if (law.mantissa === 0) return refusedValue(`The asymptotic law is 0 at n = ${n}, where K has no probability.`);
  const ratio = (exact.mantissa / law.mantissa) * 2 ** (exact.exponent - law.exponent);
  if (exact.mantissa === 0)
    return numberValue(approximate(0, (exact.error / law.mantissa) * 2 ** (exact.exponent - law.exponent)));
  const relative = Math.abs(exact.error / exact.mantissa) + Math.abs(law.error / law.mantissa) + 2 * Number.EPSILON;
  return numberValue(approximate(ratio, Math.abs(ratio) * relative));
}

/** A ratio as doubles; NaN where it is refused. */
export function numberOf(value: Value): { ratio: number; error: number } {
  if (value.type !== "number") return { ratio: Number.NaN, error: 0 };
  return { ratio: toDouble(value.quantity), error: value.quantity.error };
}
