import type { Quantity } from "../../formulas/index.ts";
import { printExact, printNumber, scaled } from "../../formulas/index.ts";
import type { NoRoot, Root, Sample } from "../../solvers/index.ts";

/** Digits of arguments and values in messages. */
const DIGITS = 6;

/** Why no root is given, with the formula's values where it matters, and what would do. */
export function whyNoRoot(found: NoRoot, name: string, from: number, to: number): string {
  switch (found.why) {
    case "no values":
      return `\`where\` has no value for any \`${name}\` tried from ${at(from)} to ${at(to)}: ${found.reason}`;
    case "same sign": {
      const told = `\`where\` is ${value(found.low)} at ${name} = ${at(found.low.x)} and ${value(found.high)} at ${name} = ${at(found.high.x)}`;
      const rest = found.unanswered === null ? "" : ` Elsewhere it has no value: ${found.unanswered}`;
      return `${told}: it does not change sign between them. \`between\` takes two ends at which its signs differ.${rest}`;
    }
    case "undecided end":
      return `\`where\` is 0 within its error at ${name} = ${at(found.end.x)}, the end of \`between\`; an end a little further out would enclose the root.`;
    case "gap":
      return `\`where\` changes sign between ${name} = ${at(found.low.x)} and ${at(found.high.x)}, where it has no value: ${found.reason}`;
    case "jump":
      return `\`where\` jumps at ${name} = ${at(found.low.x)} from ${value(found.low)} to ${value(found.high)}: its sign changes there, but it does not become 0. An interval on one side of the jump may hold a root.`;
  }
}

/** At which end of the interval the formula had no value, and why; null where it had one at both. */
export function withoutValuesWords(found: Root, name: string, from: number, to: number): string | null {
  if (found.unanswered === null) return null;
  const [low, high] = found.answered;
  const ends = [...(low > from ? [from] : []), ...(high < to ? [to] : [])].map((x) => `${name} = ${at(x)}`);
  return ends.length === 0 ? null : `no value at ${ends.join(" and ")}: ${found.unanswered}`;
}

function at(x: number): string {
  return printExact(Number(x.toPrecision(DIGITS)));
}

/** A value with the digits that its error supports. */
function value({ value: { mantissa, exponent, error } }: Sample): string {
  const quantity: Quantity = scaled(mantissa, exponent, error);
  return printNumber(quantity, { digits: DIGITS }).text;
}
