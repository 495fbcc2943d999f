import { describe, expect, test } from "vitest";
import { toDouble } from "../../app/formulas/index.ts";
import { quantityOf, refusalOf } from "./evaluating.ts";
import { decimal, holds } from "./fraction.ts";
import { REFERENCE_VALUES } from "./reference-values.ts";

/** The references are rounded to 40 digits. */
const FORTIETH = decimal("1e-39");

describe("every function against 40 digits", () => {
  test.each(REFERENCE_VALUES)("%s", (source, value) => {
    const q = quantityOf(source);
    expect(holds(q, decimal(value), FORTIETH), `${toDouble(q)} ± ${q.error}, not ${value}`).toBe(true);
    // The bound is of use: no result here is known to fewer than 11 digits.
    expect(q.error).toBeLessThanOrEqual(1e-11 * Math.abs(q.mantissa));
  });

  test("a wrong reference is found out", () => {
    expect(holds(quantityOf("erf(1)"), decimal("0.84270079294972"), FORTIETH)).toBe(false);
  });
});

describe("published values", () => {
  // Abramowitz and Stegun (1964), Table 7.1: erf to 10 decimals.
  test.each([
    ["erf(0.5)", "0.5204998778"],
    ["erf(1)", "0.8427007929"],
    ["erf(2)", "0.9953222650"],
  ])("%s = %s", (source, value) => {
    expect(quantityOf(source).mantissa.toFixed(10)).toBe(value);
  });

  // Abramowitz and Stegun (1964), 6.1.8 to 6.1.15: gamma at thirds and quarters.
  test.each([
    ["gamma(1/2)", 1.7724538509],
    ["gamma(1/3)", 2.6789385347],
    ["gamma(2/3)", 1.3541179394],
    ["gamma(1/4)", 3.6256099082],
    ["gamma(3/4)", 1.2254167024],
  ])("%s", (source, value) => {
    expect(quantityOf(source).mantissa).toBeCloseTo(value, 9);
  });
});

describe("closed forms", () => {
  test.each([
    ["gamma(6)", 120],
    ["gamma(19)", 6402373705728000],
    ["choose(52, 5)", 2598960],
    ["choose(5, 7)", 0],
    ["choose(7, 0)", 1],
    ["choose(56, 28)", 7648690600760440],
    ["sqrt(144)", 12],
    ["log10(1000)", 3],
    ["exp(0)", 1],
    ["lgamma(2)", 0],
    ["floor(-1.5)", -2],
    ["ceil(-1.5)", -1],
    ["round(-2.5)", -3],
    ["round(0.49999999999999994)", 0],
    ["abs(-3)", 3],
    ["min(3, -1, 2)", -1],
    ["max(3, -1, 2)", 3],
    ["acos(1)", 0],
    ["sum(n, n, 1, 100)", 5050],
    ["sum(n, n, 5, 4)", 0],
    ["least(2^n > 1000, n, 0, 100)", 10],
  ])("%s = %d without error", (source, value) => {
    const q = quantityOf(source);
    expect([toDouble(q), q.error]).toEqual([value, 0]);
  });
});

describe("where a function has no value it says why", () => {
  test.each([
    ["sqrt(-1.2)", "sqrt of a negative number, -1.2"],
    ["log(0)", "log of zero"],
    ["log(-2)", "log of a negative number, -2"],
    ["log10(-2)", "log10 of a negative number, -2"],
    ["asin(1.5)", "asin of 1.5, which is outside the interval from -1 to 1"],
    ["log1p(-1)", "log1p of -1, which is not above -1 within its error"],
    ["gamma(-3)", "gamma has no value at 0, -1, -2, ...; here at -3"],
    ["lgamma(0)", "lgamma has no value at 0, -1, -2, ...; here at 0"],
    ["choose(3, 1.5)", "choose(n, k) with k = 1.5; k is a whole number from 0 to 100000"],
    ["exp(10^12)", "exp of 1000000000000, which is too large in size"],
    ["sinh(1000)", "sinh of 1000, which is too large in size"],
    ["sum(1/n, n, 0, 3)", "division by zero, at n = 0"],
    ["sum(n, n, 1, 2.5)", "sum goes over whole numbers, and 2.5 is not an exact whole number"],
    ["least(n > 10, n, 1, 5)", "the condition of least holds for no n from 1 to 5"],
    ["integral(1/x, x, -1, 1)", "the integral over x does not settle; its integrand may be unbounded or too rough"],
    [
      "integral(if(x < 1, none, x), x, 0, 1)",
      "none draws nothing and is not a number that integral could take, at x = 0.000534",
    ],
    ["derivative(abs(x), x, 0)", "there is no derivative at x = 0: the slopes from the left and right differ"],
    ["derivative(log(x), x, 0)", "log of zero, at x = 0"],
  ])("%s", (source, reason) => {
    expect(refusalOf(source).slice(0, reason.length)).toBe(reason);
  });
});
