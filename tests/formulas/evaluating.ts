import {
  compileFormula,
  newBudget,
  parseFormula,
  type Quantity,
  type Scope,
  type Value,
} from "../../app/formulas/index.ts";

/** A scope of numbers by name, and of nothing else. */
export function scopeOf(names: Readonly<Record<string, Quantity | Value>> = {}): Scope {
  return {
    name: (name) => {
      const found = Object.hasOwn(names, name) ? names[name] : undefined;
      if (found === undefined) return undefined;
      return "type" in found ? found : { type: "number", quantity: found };
    },
    member: () => undefined,
    call: () => undefined,
  };
}

/** Evaluates a source text; a mistake in it fails the test with its message. */
export function valueOfSource(source: string, scope: Scope = scopeOf(), operations?: number): Value {
  const parsed = parseFormula(source);
  if (!parsed.ok) throw new Error(`${source}: ${parsed.problem.message}`);
  return compileFormula(parsed.formula)(scope, newBudget(operations));
}

export function quantityOf(source: string, scope?: Scope): Quantity {
  const value = valueOfSource(source, scope);
  if (value.type !== "number") throw new Error(`${source} gave ${JSON.stringify(value)}`);
  return value.quantity;
}

export function refusalOf(source: string, scope?: Scope): string {
  const value = valueOfSource(source, scope);
  if (value.type !== "refused") throw new Error(`${source} gave ${JSON.stringify(value)}`);
  return value.reason;
}

export function problemOf(source: string): { message: string; part: string } {
  const parsed = parseFormula(source);
  if (parsed.ok) throw new Error(`${source} was read as ${JSON.stringify(parsed.formula)}`);
  const { message, from, to } = parsed.problem;
  return { message, part: source.slice(from, to) };
}
