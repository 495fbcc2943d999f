import { nearestSpelling } from "../spelling/index.ts";
import { add, type Computed, divide, isAtMost, isEqual, isLess, multiply, negate, subtract } from "./arithmetic.ts";
import { bindEvaluator } from "./binders.ts";
import { spend } from "./budget.ts";
import { numericFunction } from "./functions.ts";
import { chooseCost } from "./gamma-function.ts";
import { power } from "./powers.ts";
import { approximate, exact } from "./quantity.ts";
import type { Budget, Formula, Quantity, Scope, Value } from "./types.ts";
import { notANumber, notATruth, refuse, truth } from "./values.ts";
import { FUNCTIONS } from "./words.ts";

/** A compiled formula. @throws FormulaError "budget" when the budget is used up; nothing else. */
export type Evaluator = (scope: Scope, budget: Budget) => Value;

const NONE: Value = { type: "none" };
/** pi and e as doubles, with bounds on what the doubles miss. Source: OEIS A000796, A001113. */
const CONSTANT_VALUES: ReadonlyMap<string, Quantity> = new Map([
  ["pi", approximate(Math.PI, 1.2247e-16)],
  ["e", approximate(Math.E, 1.4457e-16)],
]);

const BINARY: ReadonlyMap<string, (a: Quantity, b: Quantity) => Computed> = new Map<
  string,
  (a: Quantity, b: Quantity) => Computed
>([
  ["add", add],
  ["subtract", subtract],
  ["multiply", multiply],
  ["divide", divide],
  ["power", power],
]);

const COMPARISONS: ReadonlyMap<string, (a: Quantity, b: Quantity) => boolean | null> = new Map<
  string,
  (a: Quantity, b: Quantity) => boolean | null
>([
  ["lt", isLess],
  ["le", isAtMost],
  ["gt", (a, b) => isLess(b, a)],
  ["ge", (a, b) => isAtMost(b, a)],
  ["eq", isEqual],
  ["ne", (a, b) => !isEqual(a, b)],
]);

/**
 * Turns a checked tree into closures. A refused operand refuses the whole, with its own reason; `if`, `and`, `or`
 * evaluate only what they need; truths may be undecided (null), and an `if` on such a one is refused.
 * Numbers read from the scope are named as sources of chance, so that what is read twice hangs together.
 */
export function compileFormula(formula: Formula): Evaluator {
  switch (formula.node) {
    case "number": {
      const value: Value = { type: "number", quantity: exact(formula.value) };
      return () => value;
    }
    case "none":
      return () => NONE;
    case "name": {
      const { name } = formula;
      const missing = refuse(`there is no parameter or variable called ${name}`);
      return (scope, budget) => {
        spend(budget, 1);
        return withSource(scope.name(name), name) ?? missing;
      };
    }
    case "member": {
      const { of, member } = formula;
      const missing = refuse(`there is no value ${of}.${member}`);
      return (scope, budget) => {
        spend(budget, 1);
        return withSource(scope.member(of, member), `${of}.${member}`) ?? missing;
      };
    }
    case "call":
      return compileCall(formula);
    case "bind":
      return bindEvaluator(formula, compileFormula);
    case "apply":
      return compileApply(formula.name, formula.args);
  }
}

function withSource(value: Value | undefined, name: string): Value | undefined {
  if (value?.type !== "number" || value.quantity.se === 0 || value.quantity.sources) return value;
  return { type: "number", quantity: { ...value.quantity, sources: { [name]: value.quantity.se } } };
}

function compileCall(formula: Extract<Formula, { node: "call" }>): Evaluator {
  const { of, member } = formula;
  const args = formula.args.map(compileFormula);
  const label = member === "" ? of : `${of}.${member}`;
  const near =
    member === ""
      ? nearestSpelling(
          of,
          FUNCTIONS.map((word) => word.name),
        )
      : null;
  const hint = near === null ? "" : `; did you mean ${near}?`;
  return (scope, budget) => {
    spend(budget, 1);
    const quantities = numbersOf(args, scope, budget, label);
    if (!Array.isArray(quantities)) return quantities;
    const value = scope.call(of, member, quantities);
    if (value === undefined) return refuse(`${label} cannot be called${hint}`);
    if (value.type !== "number" || value.quantity.se === 0) return value;
    return withSource(value, `${label}(${quantities.map((q) => `${q.mantissa}p${q.exponent}`).join(",")})`) ?? value;
  };
}

/** The arguments as numbers, or the first value that is none. */
function numbersOf(args: readonly Evaluator[], scope: Scope, budget: Budget, by: string): Quantity[] | Value {
  const quantities: Quantity[] = [];
  for (const arg of args) {
    const value = arg(scope, budget);
    if (value.type !== "number") return notANumber(value, by);
    quantities.push(value.quantity);
  }
  return quantities;
}

function compileApply(name: string, argFormulas: readonly Formula[]): Evaluator {
  const constant = CONSTANT_VALUES.get(name);
  if (constant) {
    const value: Value = { type: "number", quantity: constant };
    return () => value;
  }
  const args = argFormulas.map(compileFormula);
  const [first, second, third] = args as [Evaluator, Evaluator, Evaluator];
  if (name === "if") return compileIf(first, second, third);
  if (name === "and" || name === "or") return compileLogical(name, first, second);
  if (name === "not") return compileNot(first);
  if (name === "negate") return compileNumeric("-", args, ([a]) => negate(a as Quantity));
  const comparison = COMPARISONS.get(name);
  if (comparison) return compileComparison(name, first, second, comparison);
  const binary = BINARY.get(name);
  if (binary) return compileNumeric(name, args, ([a, b]) => binary(a as Quantity, b as Quantity));
  const numeric = numericFunction(name);
  if (numeric === undefined) return () => refuse(`there is no function called ${name}`);
  return compileNumeric(name, args, numeric);
}

function compileNumeric(
  name: string,
  args: readonly Evaluator[],
  operation: (args: readonly Quantity[]) => Computed,
): Evaluator {
  return (scope, budget) => {
    spend(budget, 1);
    const quantities = numbersOf(args, scope, budget, name);
    if (!Array.isArray(quantities)) return quantities;
    if (name === "choose") spend(budget, chooseCost(quantities[0] as Quantity, quantities[1] as Quantity));
    const result = operation(quantities);
    if (typeof result === "string") return refuse(result);
    const isSound = Number.isFinite(result.mantissa) && Number.isFinite(result.error) && Number.isFinite(result.se);
    return isSound ? { type: "number", quantity: result } : refuse(`${name} gives a number that is too large in size`);
  };
}

function compileComparison(
  name: string,
  left: Evaluator,
  right: Evaluator,
  compare: (a: Quantity, b: Quantity) => boolean | null,
): Evaluator {
  return (scope, budget) => {
    spend(budget, 1);
    const a = left(scope, budget);
    const b = right(scope, budget);
    if (a.type === "number" && b.type === "number") return truth(compare(a.quantity, b.quantity));
    if (a.type === "text" && b.type === "text" && (name === "eq" || name === "ne")) {
      return truth((a.text === b.text) === (name === "eq"));
    }
    return a.type === "number" ? notANumber(b, "a comparison") : notANumber(a, "a comparison");
  };
}

function compileIf(condition: Evaluator, then: Evaluator, otherwise: Evaluator): Evaluator {
  return (scope, budget) => {
    spend(budget, 1);
    const value = condition(scope, budget);
    if (value.type !== "truth") return notATruth(value, "if");
    if (value.holds === null) return refuse("the condition of if cannot be decided within the errors of its numbers");
    return value.holds ? then(scope, budget) : otherwise(scope, budget);
  };
}

/** `and` and `or` on truths that may be undecided: what one side decides alone, the other cannot change. */
function compileLogical(name: "and" | "or", left: Evaluator, right: Evaluator): Evaluator {
  const deciding = name === "or";
  return (scope, budget) => {
    spend(budget, 1);
    const a = left(scope, budget);
    if (a.type !== "truth") return notATruth(a, name);
    if (a.holds === deciding) return a;
    const b = right(scope, budget);
    if (b.type !== "truth") return notATruth(b, name);
    if (b.holds === deciding) return b;
    return a.holds === null ? a : b;
  };
}

function compileNot(inner: Evaluator): Evaluator {
  return (scope, budget) => {
    spend(budget, 1);
    const value = inner(scope, budget);
    if (value.type !== "truth") return notATruth(value, "not");
    return value.holds === null ? value : truth(!value.holds);
  };
}
