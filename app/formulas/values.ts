import { inWords } from "./arithmetic.ts";
import type { Quantity, Value } from "./types.ts";

/** No value, and why. @param reason a clause without a full stop */
export function refuse(reason: string): Value {
  return { type: "refused", reason };
}

/** What a comparison gives; null: the errors leave it open. */
export function truth(holds: boolean | null): Value {
  return { type: "truth", holds };
}

/** A number as a value. */
export function number(quantity: Quantity): Value {
  return { type: "number", quantity };
}

/** What comes of a value that is no number where `by` needs one: its own refusal, or one that says so. */
export function notANumber(value: Value, by: string): Value {
  switch (value.type) {
    case "refused":
      return value;
    case "none":
      return refuse(`none draws nothing and is not a number that ${by} could take`);
    case "text":
      return refuse(`"${value.text}" is not a number that ${by} could take`);
    default:
      return refuse(`a comparison holds or does not; it is not a number that ${by} could take`);
  }
}

/** What comes of a value that is no truth where `by` needs one. */
export function notATruth(value: Value, by: string): Value {
  return value.type === "refused" ? value : refuse(`${by} takes a comparison, such as x < 1`);
}

/** The body of a sum, integral, derivative or search as a function of its variable. */
export type Body = (x: Quantity) => Value;

/** The same refusal, with the place where it arose. */
export function at(value: Value, variable: string, x: Quantity): Value {
  return value.type === "refused" ? refuse(`${value.reason}, at ${variable} = ${inWords(x)}`) : value;
}
