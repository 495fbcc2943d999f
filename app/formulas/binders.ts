import { add, inWords, isWhole } from "./arithmetic.ts";
import { spend } from "./budget.ts";
import { differentiate } from "./derivative.ts";
import { integrate } from "./integral.ts";
import { exact } from "./quantity.ts";
import type { Budget, Formula, Quantity, Scope, Value } from "./types.ts";
import { at, type Body, notANumber, notATruth, number, refuse } from "./values.ts";

type Evaluator = (scope: Scope, budget: Budget) => Value;
type Binder = (body: Body, args: readonly Quantity[], variable: string, budget: Budget) => Value;

const BINDER_RULES: ReadonlyMap<string, Binder> = new Map<string, Binder>([
  ["sum", sum],
  ["least", least],
  ["integral", integrate],
  ["derivative", differentiate],
]);

/** Compiles sum, integral, derivative and least; `compile` is the compiler of the body and of the arguments. */
export function bindEvaluator(
  formula: Extract<Formula, { node: "bind" }>,
  compile: (formula: Formula) => Evaluator,
): Evaluator {
  const { binder, variable } = formula;
  const rule = BINDER_RULES.get(binder);
  if (rule === undefined) return () => refuse(`there is no function called ${binder}`);
  const body = compile(formula.body);
  const args = formula.args.map(compile);
  return (scope, budget) => {
    spend(budget, 1);
    const quantities: Quantity[] = [];
    for (const arg of args) {
      const value = arg(scope, budget);
      if (value.type !== "number") return notANumber(value, binder);
      quantities.push(value.quantity);
    }
    const within = new Within(scope, variable);
    const bodyAt: Body = (x) => {
      spend(budget, 1);
      within.value = number(x);
      return body(within, budget);
    };
    return rule(bodyAt, quantities, variable, budget);
  };
}

/** A scope with a dummy variable in it, whose value goes from term to term: one object for a sum of many terms. */
class Within implements Scope {
  value: Value | undefined;
  readonly #around: Scope;
  readonly #variable: string;

  constructor(around: Scope, variable: string) {
    this.#around = around;
    this.#variable = variable;
  }

  name(name: string): Value | undefined {
    return name === this.#variable ? this.value : this.#around.name(name);
  }

  member(of: string, member: string): Value | undefined {
    return this.#around.member(of, member);
  }

  call(of: string, member: string, args: readonly Quantity[]): Value | undefined {
    return this.#around.call(of, member, args);
  }
}

/** The two whole numbers that bound a sum or a search, or why they do not. */
function wholeRange(binder: string, args: readonly Quantity[]): readonly [number, number] | string {
  const [a, b] = args as readonly [Quantity, Quantity];
  for (const bound of [a, b]) {
    if (!isWhole(bound)) return `${binder} goes over whole numbers, and ${inWords(bound)} is not an exact whole number`;
  }
  return [a.mantissa, b.mantissa];
}

/** F(a) + ... + F(b), with the errors of the terms and of the additions; 0 when b < a. */
function sum(body: Body, args: readonly Quantity[], variable: string): Value {
  const range = wholeRange("sum", args);
  if (typeof range === "string") return refuse(range);
  let total = exact(0);
  for (let n = range[0]; n <= range[1]; n++) {
    const term = body(exact(n));
    if (term.type !== "number") return at(notANumber(term, "sum"), variable, exact(n));
    total = add(total, term.quantity);
  }
  return number(total);
}

/** The first whole number for which the condition holds; refused where one before it cannot be decided. */
function least(body: Body, args: readonly Quantity[], variable: string): Value {
  const range = wholeRange("least", args);
  if (typeof range === "string") return refuse(range);
  for (let n = range[0]; n <= range[1]; n++) {
    const value = body(exact(n));
    if (value.type !== "truth") return at(notATruth(value, "least"), variable, exact(n));
    if (value.holds === null) {
      return refuse(`the condition of least cannot be decided within the errors at ${variable} = ${n}`);
    }
    if (value.holds) return number(exact(n));
  }
  return refuse(`the condition of least holds for no ${variable} from ${range[0]} to ${range[1]}`);
}
