import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  approximate,
  exact,
  log10Of,
  type Quantity,
  quantityToJson,
  scaled,
  toDouble,
} from "../../app/formulas/index.ts";
import { quantityOf, refusalOf, scopeOf, valueOfSource } from "./evaluating.ts";
import { atMost, binary, errorOf, type Fraction, fractionOf, minus, over, plus, size, times } from "./fraction.ts";

/** A number of any size, its bound, and the truth it stands for: somewhere within the bound. */
interface Sample {
  readonly q: Quantity;
  readonly truth: Fraction;
}

const mantissa = fc.oneof(
  fc.double({ min: 0.5, max: 1, noNaN: true }),
  fc.integer({ min: 1, max: 2 ** 30 }),
  fc.double({ min: 1e-10, max: 1e10, noNaN: true }),
);
const sample: fc.Arbitrary<Sample> = fc
  .record({
    m: mantissa,
    sign: fc.constantFrom(1, -1),
    e: fc.oneof(fc.constant(0), fc.integer({ min: -3000, max: 3000 })),
    width: fc.oneof(
      fc.constant(0),
      fc.integer({ min: -48, max: -4 }).map((k) => 2 ** k),
    ),
    where: fc.integer({ min: -8, max: 8 }),
  })
  .map(({ m, sign, e, width, where }) => {
    const q = scaled(sign * m, e, m * width);
    const shift = times(errorOf(q), { over: BigInt(where), under: 8n });
    return { q, truth: plus(fractionOf(q), shift) };
  });

const OPERATIONS: readonly (readonly [string, (a: Fraction, b: Fraction) => Fraction])[] = [
  ["a + b", plus],
  ["a - b", minus],
  ["a*b", times],
  ["a/b", over],
];

describe("the error bound holds, judged in exact fractions", () => {
  test.each(OPERATIONS)("%s", (source, truth) => {
    fc.assert(
      fc.property(sample, sample, (a, b) => {
        const q = quantityOf(source, scopeOf({ a: a.q, b: b.q }));
        const miss = size(minus(fractionOf(q), truth(a.truth, b.truth)));
        expect(atMost(miss, errorOf(q))).toBe(true);
      }),
      { numRuns: 400 },
    );
  });

  test("sqrt", () => {
    fc.assert(
      fc.property(sample, ({ q: signed, truth: signedTruth }) => {
        const x = { ...signed, mantissa: Math.abs(signed.mantissa) };
        const root = quantityOf("sqrt(x)", scopeOf({ x }));
        const low = minus(fractionOf(root), errorOf(root));
        const high = plus(fractionOf(root), errorOf(root));
        const truth = size(signedTruth);
        expect(low.over < 0n || atMost(times(low, low), truth)).toBe(true);
        expect(atMost(truth, times(high, high))).toBe(true);
      }),
    );
  });

  test("whole powers", () => {
    fc.assert(
      fc.property(sample, fc.integer({ min: 1, max: 90 }), (a, n) => {
        const q = quantityOf(`a^${n}`, scopeOf({ a: a.q }));
        const truth: Fraction = { over: a.truth.over ** BigInt(n), under: a.truth.under ** BigInt(n) };
        expect(atMost(size(minus(fractionOf(q), truth)), errorOf(q))).toBe(true);
      }),
      { numRuns: 200 },
    );
  });

  test("chains of operations", () => {
    fc.assert(
      fc.property(sample, sample, sample, (a, b, c) => {
        const q = quantityOf("(a*b - c)*(a + c)/b", scopeOf({ a: a.q, b: b.q, c: c.q }));
        const truth = over(times(minus(times(a.truth, b.truth), c.truth), plus(a.truth, c.truth)), b.truth);
        expect(atMost(size(minus(fractionOf(q), truth)), errorOf(q))).toBe(true);
      }),
      { numRuns: 200 },
    );
  });

  test("a bound that is too small by a thousandth is found out", () => {
    const q = quantityOf("1/3");
    const tooSmall = times(errorOf(q), { over: 999n, under: 1000n });
    expect(atMost(size(minus(fractionOf(q), { over: 1n, under: 3n })), tooSmall)).toBe(false);
  });
});

describe("exact numbers", () => {
  test("whole numbers stay whole and exact", () => {
    fc.assert(
      fc.property(fc.integer({ min: -90000, max: 90000 }), fc.integer({ min: -90000, max: 90000 }), (a, b) => {
        const scope = scopeOf({ a: exact(a), b: exact(b) });
        for (const [source, value] of [
          ["a + b", a + b],
          ["a - b", a - b],
          ["a*b", a * b],
          ["2*a + 1", 2 * a + 1],
        ] as const) {
          expect(quantityOf(source, scope)).toEqual(exact(value === 0 ? 0 : value));
        }
      }),
    );
  });

  test("a rounding is an error, an exact operation is none", () => {
    expect(quantityOf("1/4").error).toBe(0);
    expect(quantityOf("0.1 + 0.2").error).toBeGreaterThan(0);
    expect(quantityOf("2^53 + 1").error).toBe(1);
  });

  test("error and se are numbers themselves", () => {
    const scope = scopeOf({ x: approximate(3, 0.25, 0.5) });
    expect(quantityOf("error(x)", scope)).toEqual(exact(0.25));
    expect(quantityOf("se(2*x)", scope).mantissa).toBe(1);
  });
});

describe("beyond the range of doubles", () => {
  test("10^-741 is an ordinary number", () => {
    const q = quantityOf("2.58*10^-741");
    expect(log10Of(q)).toBeCloseTo(Math.log10(2.58) - 741, 12);
    expect(toDouble(q)).toBe(0);
    expect(quantityToJson(q)).toEqual({ value: 0, error: Number.MIN_VALUE, log10: log10Of(q) });
    expect(quantityOf("10^-741/10^-740").exponent).toBe(0);
    expect(quantityOf("10^-741/10^-740").mantissa).toBeCloseTo(0.1, 14);
    expect(quantityOf("log10(10^-741)").mantissa).toBeCloseTo(-741, 10);
    expect(quantityOf("sqrt(10^-741)^2*10^741").mantissa).toBeCloseTo(1, 12);
    expect(valueOfSource("10^-741 < 10^-740")).toEqual({ type: "truth", holds: true });
    expect(valueOfSource("10^-741 > 0")).toEqual({ type: "truth", holds: true });
  });

  test("JSON of ordinary numbers has no log10, and se only where there is one", () => {
    expect(quantityToJson(approximate(1.5, 0.25))).toEqual({ value: 1.5, error: 0.25 });
    expect(quantityToJson(approximate(1.5, 0, 0.25))).toEqual({ value: 1.5, error: 0, se: 0.25 });
    expect(quantityToJson(exact(0))).toEqual({ value: 0, error: 0 });
    expect(quantityToJson(quantityOf("10^400"))).toEqual({
      value: Number.MAX_VALUE,
      error: Number.MAX_VALUE,
      log10: 400,
    });
  });

  test("normal form: exponent 0 wherever a double suffices", () => {
    fc.assert(
      fc.property(mantissa, fc.integer({ min: -900, max: 900 }), (m, e) => {
        expect(scaled(m, e, 0)).toEqual({ mantissa: m * 2 ** e, exponent: 0, error: 0, se: 0 });
      }),
    );
    expect(fractionOf(scaled(3, -5000, 0))).toEqual(binary(0.75, -4998));
  });
});

describe("chance", () => {
  const scope = scopeOf({ x: approximate(3, 0, 0.3), y: approximate(4, 0, 0.4) });

  test("independent standard errors add in quadrature", () => {
    expect(quantityOf("x + y", scope).se).toBeCloseTo(0.5, 12);
    expect(quantityOf("x*y", scope).se).toBeCloseTo(Math.hypot(0.3 * 4, 0.4 * 3), 12);
    expect(quantityOf("x/y", scope).se).toBeCloseTo(Math.hypot(0.3 / 4, (0.4 * 3) / 16), 12);
    expect(quantityOf("log(x)", scope).se).toBeCloseTo(0.1, 12);
    expect(quantityOf("exp(x)", scope).se).toBeCloseTo(0.3 * Math.exp(3), 10);
    expect(quantityOf("x^2.5", scope).se).toBeCloseTo(2.5 * 3 ** 1.5 * 0.3, 10);
    expect(quantityOf("gamma(x)", scope).se).toBeCloseTo(0.3 * 2 * (1.5 - 0.5772156649), 8);
    expect(quantityOf("erf(x)", scope).se).toBeCloseTo((0.3 * 2 * Math.exp(-9)) / Math.sqrt(Math.PI), 10);
  });

  test("what is read twice hangs together", () => {
    expect(quantityOf("x - x", scope).se).toBe(0);
    expect(quantityOf("x + x", scope).se).toBeCloseTo(0.6, 12);
    expect(quantityOf("(x + y) - x", scope).se).toBeCloseTo(0.4, 12);
  });

  test("unknowns of one fit keep their covariance", () => {
    // Covariance [[4, 2], [2, 5]] = L·L^T with L = [[2, 0], [1, 2]].
    const a: Quantity = { mantissa: 1, exponent: 0, error: 0, se: 2, sources: { m1: 2 } };
    const b: Quantity = { mantissa: 1, exponent: 0, error: 0, se: Math.sqrt(5), sources: { m1: 1, m2: 2 } };
    const fit = scopeOf({ a, b });
    expect(quantityOf("a - b", fit).se).toBeCloseTo(Math.sqrt(4 + 5 - 2 * 2), 12);
    expect(quantityOf("a + b", fit).se).toBeCloseTo(Math.sqrt(4 + 5 + 2 * 2), 12);
  });
});

describe("comparisons and choices", () => {
  const scope = scopeOf({ a: approximate(1, 0.1), b: approximate(1.05, 0.1), c: exact(2) });

  test("a difference within the errors is undecided", () => {
    expect(valueOfSource("a < b", scope)).toEqual({ type: "truth", holds: null });
    expect(valueOfSource("a >= b", scope)).toEqual({ type: "truth", holds: null });
    expect(valueOfSource("a < c", scope)).toEqual({ type: "truth", holds: true });
    expect(valueOfSource("a > c", scope)).toEqual({ type: "truth", holds: false });
    expect(valueOfSource("2 <= 2")).toEqual({ type: "truth", holds: true });
  });

  test("== and != compare exactly", () => {
    expect(valueOfSource("a == b", scope)).toEqual({ type: "truth", holds: false });
    expect(valueOfSource("0.1 + 0.2 == 0.3")).toEqual({ type: "truth", holds: false });
    expect(valueOfSource("a != b", scope)).toEqual({ type: "truth", holds: true });
  });

  test.each([
    ["a < b and 2 < 1", false],
    ["a < b and 1 < 2", null],
    ["a < b or 1 < 2", true],
    ["a < b or 2 < 1", null],
    ["not (a < b)", null],
    ["not (2 < 1)", true],
  ])("%s is %s", (source, holds) => {
    expect(valueOfSource(source, scope)).toEqual({ type: "truth", holds });
  });

  test("an undecided choice is refused", () => {
    expect(refusalOf("if(a < b, 1, 2)", scope)).toBe(
      "the condition of if cannot be decided within the errors of its numbers",
    );
  });

  test("only the chosen branch is evaluated", () => {
    expect(quantityOf("if(1 < 2, 3, 1/0)").mantissa).toBe(3);
  });

  test("texts compare with each other only", () => {
    const texts = scopeOf({ p: { type: "text", text: "away" }, q: { type: "text", text: "away" }, x: exact(1) });
    expect(valueOfSource("p == q", texts)).toEqual({ type: "truth", holds: true });
    expect(valueOfSource("p != q", texts)).toEqual({ type: "truth", holds: false });
    expect(refusalOf("p < q", texts)).toBe('"away" is not a number that a comparison could take');
    expect(refusalOf("p + 1", texts)).toBe('"away" is not a number that add could take');
  });
});

describe("refusals", () => {
  const scope = scopeOf({ small: approximate(0.01, 0.1), gone: { type: "refused", reason: "the mean is infinite" } });

  test.each([
    ["1/0", "division by zero"],
    ["1/small", "division by a number that cannot be told from zero within its error"],
    ["log(small)", "log of a number that cannot be told from zero within its error"],
    ["floor(small)", "floor of 0.01 cannot be decided within its error"],
    ["0^-1", "zero to the negative power -1"],
    ["0^-0.5", "zero to the power -0.5, which is not above 0"],
    ["(-8)^0.5", "a negative number, -8, to a power that is not whole, 0.5"],
    ["gone + 1", "the mean is infinite"],
    ["if(gone < 1, 1, 2)", "the mean is infinite"],
    ["missing", "there is no parameter or variable called missing"],
    ["K.mean", "there is no value K.mean"],
    ["none + 1", "none draws nothing and is not a number that add could take"],
    ["2^(10^15)", "a power too large in size to be a number here"],
  ])("%s", (source, reason) => {
    expect(refusalOf(source, scope)).toBe(reason);
  });

  test("sqrt of a number that may be 0 is a number that may be 0", () => {
    const q = quantityOf("sqrt(small)", scope);
    expect(q.mantissa).toBeCloseTo(0.1, 12);
    expect(q.error).toBeGreaterThan(Math.sqrt(0.11) - 0.1);
  });

  test("no value is ever infinite or NaN", () => {
    fc.assert(
      fc.property(
        sample,
        sample,
        fc.constantFrom("a^b", "exp(a)", "gamma(a)", "tan(a)", "erfc(a)", "sinh(a*b)", "log(a/b)", "acos(a)"),
        (a, b, source) => {
          const value = valueOfSource(source, scopeOf({ a: a.q, b: b.q }));
          if (value.type !== "number") {
            expect(value.type).toBe("refused");
            return;
          }
          expect(Number.isFinite(value.quantity.mantissa) && Number.isFinite(value.quantity.error)).toBe(true);
        },
      ),
      { numRuns: 1000 },
    );
  });
});

describe("budget", () => {
  test.each([
    "sum(sum(sum(i*j*k, i, 1, 1000), j, 1, 1000), k, 1, 1000)",
    "least(n < 0, n, 0, 10^12)",
    "choose(10^9, 100000) + choose(10^9, 100000)",
    "integral(integral(sin(x*y), x, 0, 100), y, 0, 100)",
  ])("%s stops", (source) => {
    expect(() => valueOfSource(source, undefined, 20_000)).toThrow(/takes more operations than one formula may/);
  });
});
