import { absolute, add, divide, inWords, multiply, subtract } from "./arithmetic.ts";
import { exponentOf } from "./doubles.ts";
import { exact, log10Of, scaled } from "./quantity.ts";
import type { Quantity, Value } from "./types.ts";
import { at, type Body, notANumber, number, refuse } from "./values.ts";

const LEVELS = 22;
/** How often the first step may be halved to come into the domain of F. */
const SEARCH = 60;

interface Level {
  readonly slope: Quantity;
  /** |right slope - left slope|, which falls with the step where F is smooth. */
  readonly kink: Quantity;
  /** Second difference over the squared step. */
  readonly bend: Quantity;
}

/**
 * Derivative of the body by Richardson extrapolation of central differences with halved steps. The entry of the
 * tableau with the smallest error is taken; its error is the largest difference to its two ancestors plus what the
 * errors of F grew to, and |F''| times the error of the point.
 * Source: Ridders (1982), Advances in Engineering Software 4, 75-76.
 */
export function differentiate(body: Body, args: readonly Quantity[], variable: string): Value {
  const x = args[0] as Quantity;
  if (x.exponent !== 0) return refuse(`derivative at ${inWords(x)}, which is too large or too small in size`);
  const centre = body(exact(x.mantissa));
  if (centre.type !== "number") return at(notANumber(centre, "derivative"), variable, x);
  let step = 2 ** (exponentOf(Math.max(Math.abs(x.mantissa), 1)) - 3);
  let first: Level | Value = levelAt(body, x.mantissa, step, centre.quantity);
  for (let i = 0; i < SEARCH && "type" in first; i++) {
    step /= 2;
    first = levelAt(body, x.mantissa, step, centre.quantity);
  }
  if ("type" in first) return at(first, variable, x);
  const levels: Level[] = [first];
  for (let i = 1; i < LEVELS; i++) {
    step /= 2;
    const level = levelAt(body, x.mantissa, step, centre.quantity);
    if ("type" in level) return at(level, variable, x);
    levels.push(level);
  }
  return best(levels, x, variable);
}

function levelAt(body: Body, x: number, step: number, centre: Quantity): Level | Value {
  const right = body(exact(x + step));
  if (right.type !== "number") return notANumber(right, "derivative");
  const left = body(exact(x - step));
  if (left.type !== "number") return notANumber(left, "derivative");
  const across = divide(subtract(right.quantity, left.quantity), exact(x + step - (x - step)));
  const after = subtract(right.quantity, centre);
  const before = subtract(centre, left.quantity);
  const kink = divide(absolute(subtract(after, before)), exact(step));
  if (typeof across === "string" || typeof kink === "string") return refuse("derivative with a step too small");
  const bend = divide(kink, exact(step));
  return { slope: across, kink, bend: typeof bend === "string" ? exact(0) : bend };
}

function best(levels: readonly Level[], x: Quantity, variable: string): Value {
  let chosen: { value: Quantity; error: Quantity; level: number } | null = null;
  let ancestors: Quantity[] = [];
  for (const [i, level] of levels.entries()) {
    const row: Quantity[] = [level.slope];
    for (let j = 1; j <= i; j++) {
      const factor = 4 ** j;
      const finer = row[j - 1] as Quantity;
      const coarser = ancestors[j - 1] as Quantity;
      const value = divide(subtract(multiply(finer, exact(factor)), coarser), exact(factor - 1));
      if (typeof value === "string") break;
      row.push(value);
      const gap = largerOf(bare(subtract(value, finer)), bare(subtract(value, coarser)));
      const error = add(gap, { mantissa: value.error, exponent: value.exponent, error: 0, se: 0 });
      if (chosen === null || log10Of(error) < log10Of(chosen.error)) chosen = { value, error, level: i };
    }
    ancestors = row;
  }
  if (chosen === null) return refuse("derivative could not be estimated");
  if (isKinked(levels)) {
    return refuse(`there is no derivative at ${variable} = ${inWords(x)}: the slopes from the left and right differ`);
  }
  const { bend } = levels[chosen.level] as Level;
  const moved = multiply(bare(bend), exact(x.error));
  const widening = add(chosen.error, moved);
  const { mantissa, exponent, se, sources } = chosen.value;
  const value = scaled(mantissa, exponent, 0, se, sources);
  return number(add(value, { mantissa: 0, exponent: widening.exponent, error: widening.mantissa, se: 0 }));
}

/** Whether the slopes from left and right stop approaching each other; where F is smooth each step halves their gap. */
function isKinked(levels: readonly Level[]): boolean {
  const gaps = levels.filter(({ kink }) => kink.mantissa > 2 * kink.error).map(({ kink }) => log10Of(kink));
  const [coarser, middle, finest] = gaps.slice(-3) as [number, number, number];
  const stays = Math.log10(0.75);
  return gaps.length > 4 && finest - middle > stays && middle - coarser > stays;
}

function bare(q: Quantity): Quantity {
  return { mantissa: Math.abs(q.mantissa), exponent: q.exponent, error: 0, se: 0 };
}

function largerOf(a: Quantity, b: Quantity): Quantity {
  return log10Of(a) > log10Of(b) ? a : b;
}
