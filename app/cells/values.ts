import type { Quantity, Value } from "../formulas/index.ts";
import { approximate, exact, printExact, printNumber, scaled } from "../formulas/index.ts";
import type { Answer, Estimate, ScaledEstimate } from "../solvers/index.ts";

/** A whole number, or another without error. */
export function exactValue(x: number): Value {
  return { type: "number", quantity: exact(x) };
}

/** What a solver found, or why it gives nothing. */
export function estimateValue(answer: Answer<Estimate>): Value {
  return "refused" in answer ? refusedValue(answer.refused) : numberValue(approximate(answer.value, answer.error));
}

/** The same for numbers beyond the double's range. */
export function scaledValue(answer: Answer<ScaledEstimate>): Value {
  return "refused" in answer ? refusedValue(answer.refused) : numberValue(scaledQuantity(answer));
}

/** A solver's number of any size as a quantity. */
export function scaledQuantity(estimate: ScaledEstimate): Quantity {
  return scaled(estimate.mantissa, estimate.exponent, estimate.error);
}

/** A number as a value. */
export function numberValue(quantity: Quantity): Value {
  return { type: "number", quantity };
}

/** A word as a value: a regime, say. */
export function textValue(text: string): Value {
  return { type: "text", text };
}

/** No value, and why. */
export function refusedValue(reason: string): Value {
  return { type: "refused", reason };
}

/** A number for words and labels, four significant digits at most: "0.5", "5.437", "10⁻⁷". */
export function shortNumber(x: number): string {
  return printExact(Number(x.toPrecision(SHORT_DIGITS)));
}

/** The same as TeX. */
export function shortTex(x: number): string {
  return printNumber(exact(Number(x.toPrecision(SHORT_DIGITS)))).tex;
}

const SHORT_DIGITS = 4;
