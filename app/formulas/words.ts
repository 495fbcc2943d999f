/** One built-in function, for checking, for completion and for the manual. */
export interface FunctionWord {
  readonly name: string;
  /** Fewest and most arguments. */
  readonly arity: readonly [number, number];
  /** How it is written. */
  readonly form: string;
  /** One line, without the name. */
  readonly meaning: string;
}

/** Every function of the language of formulas; nothing else can be called but the callables of cells. */
export const FUNCTIONS: readonly FunctionWord[] = [
  { name: "sqrt", arity: [1, 1], form: "sqrt(x)", meaning: "square root of x >= 0" },
  { name: "exp", arity: [1, 1], form: "exp(x)", meaning: "e to the power x" },
  { name: "expm1", arity: [1, 1], form: "expm1(x)", meaning: "exp(x) - 1, accurate where x is small" },
  { name: "log", arity: [1, 1], form: "log(x)", meaning: "natural logarithm of x > 0" },
  { name: "log1p", arity: [1, 1], form: "log1p(x)", meaning: "log(1 + x), accurate where x is small" },
  { name: "log10", arity: [1, 1], form: "log10(x)", meaning: "logarithm to base 10 of x > 0" },
  { name: "sin", arity: [1, 1], form: "sin(x)", meaning: "sine of x in radians" },
  { name: "cos", arity: [1, 1], form: "cos(x)", meaning: "cosine of x in radians" },
  { name: "tan", arity: [1, 1], form: "tan(x)", meaning: "tangent of x in radians" },
  { name: "asin", arity: [1, 1], form: "asin(x)", meaning: "angle in radians whose sine is x, -1 <= x <= 1" },
  { name: "acos", arity: [1, 1], form: "acos(x)", meaning: "angle in radians whose cosine is x, -1 <= x <= 1" },
  { name: "atan", arity: [1, 1], form: "atan(x)", meaning: "angle in radians whose tangent is x" },
  { name: "sinh", arity: [1, 1], form: "sinh(x)", meaning: "hyperbolic sine" },
  { name: "cosh", arity: [1, 1], form: "cosh(x)", meaning: "hyperbolic cosine" },
  { name: "tanh", arity: [1, 1], form: "tanh(x)", meaning: "hyperbolic tangent" },
  { name: "abs", arity: [1, 1], form: "abs(x)", meaning: "absolute value" },
  { name: "min", arity: [1, 20], form: "min(a, b, ...)", meaning: "smallest of its arguments" },
  { name: "max", arity: [1, 20], form: "max(a, b, ...)", meaning: "largest of its arguments" },
  { name: "floor", arity: [1, 1], form: "floor(x)", meaning: "largest whole number <= x" },
  { name: "ceil", arity: [1, 1], form: "ceil(x)", meaning: "smallest whole number >= x" },
  { name: "round", arity: [1, 1], form: "round(x)", meaning: "nearest whole number, halves away from 0" },
  { name: "gamma", arity: [1, 1], form: "gamma(x)", meaning: "gamma function, not at 0, -1, -2, ..." },
  { name: "lgamma", arity: [1, 1], form: "lgamma(x)", meaning: "log of the absolute value of gamma(x)" },
  { name: "erf", arity: [1, 1], form: "erf(x)", meaning: "error function" },
  { name: "erfc", arity: [1, 1], form: "erfc(x)", meaning: "1 - erf(x), accurate in the far tail" },
  { name: "choose", arity: [2, 2], form: "choose(n, k)", meaning: "binomial coefficient, k a whole number >= 0" },
  {
    name: "if",
    arity: [3, 3],
    form: "if(condition, a, b)",
    meaning: "a where the condition holds, b where it does not",
  },
  { name: "error", arity: [1, 1], form: "error(F)", meaning: "half-width of the bound on the numerical error of F" },
  { name: "se", arity: [1, 1], form: "se(F)", meaning: "standard error of F, 0 where no chance enters" },
  { name: "sum", arity: [4, 4], form: "sum(F, n, a, b)", meaning: "F added up over the whole numbers n from a to b" },
  { name: "integral", arity: [4, 4], form: "integral(F, x, a, b)", meaning: "integral of F over x from a to b" },
  { name: "derivative", arity: [3, 3], form: "derivative(F, x, at)", meaning: "derivative of F by x, at a value of x" },
  {
    name: "least",
    arity: [4, 4],
    form: "least(condition, n, a, b)",
    meaning: "smallest whole number n from a to b for which the condition holds",
  },
];

const BY_NAME: ReadonlyMap<string, FunctionWord> = new Map(FUNCTIONS.map((word) => [word.name, word]));

/** The built-in function of that name, if there is one. */
export function functionNamed(name: string): FunctionWord | undefined {
  return BY_NAME.get(name);
}

/** Functions whose second argument is a variable that they bind in the first. */
export const BINDERS: ReadonlySet<string> = new Set(["sum", "integral", "derivative", "least"]);

/** Numbers that have a name. */
export const CONSTANTS: ReadonlySet<string> = new Set(["pi", "e"]);

/** Operators that are words. */
export const WORD_OPERATORS: ReadonlySet<string> = new Set(["and", "or", "not"]);

/** Words that mean something elsewhere and nothing here; refused so that nobody is misled. */
export const FOREIGN_WORDS: ReadonlyMap<string, string> = new Map([
  ["mod", "There is no mod here; write a - b*floor(a/b)."],
  ["xor", "There is no xor here; write (a or b) and not (a and b), with comparisons for a and b."],
  ["in", "There are no units in formulas, so `in` has no meaning; leave it out."],
  ["to", "An interval `a to b` is not a number; give one of the two."],
  ["true", "There is no word true; write a comparison such as 1 < 2."],
  ["false", "There is no word false; write a comparison such as 2 < 1."],
  ["null", "There is no word null; write none to draw nothing."],
  ["undefined", "There is no word undefined; write none to draw nothing."],
  ["NaN", "NaN is not a number; write none to draw nothing."],
  ["Infinity", "Infinity is not a number here; write a large number instead."],
]);

/** Names that no parameter, cell, key or dummy may have. */
export const RESERVED_NAMES: ReadonlySet<string> = new Set([
  ...BY_NAME.keys(),
  ...CONSTANTS,
  ...WORD_OPERATORS,
  ...FOREIGN_WORDS.keys(),
  "none",
]);
