import { describe, expect, test } from "vitest";
import { complexComposer, complexSeries } from "../../app/solvers/complex-series.ts";
import { inputUnit, lawUnit } from "../../app/solvers/input-rounding.ts";
import { exponentialRest, nonlinearity, prepareOffspring, upperFixedPoint } from "../../app/solvers/offspring.ts";
import { PairSeries, pairComposer } from "../../app/solvers/pair-series.ts";
import * as pairs from "../../app/solvers/pairs.ts";
import { gaussLegendre } from "../../app/solvers/quadrature.ts";
import { normalise, scaledByPower } from "../../app/solvers/scaled.ts";
import { bernoulliPolynomials, composed, inverseSquareRise } from "../../app/solvers/tail-series.ts";
import type { Offspring, Pair } from "../../app/solvers/types.ts";
import { SeededRandom } from "../support/random.ts";

/** A pair as an exact integer multiple of 2^−200. */
function exactly(x: Pair): bigint {
  const whole = (v: number) => {
    const exponent = v === 0 ? 0 : Math.floor(Math.log2(Math.abs(v)));
    return BigInt(v * 2 ** (52 - exponent)) * 2n ** BigInt(148 + exponent);
  };
  return whole(x[0]) + whole(x[1]);
}

const UNIT = 2n ** 200n;
/** |a/b − 1| < 2^−98 */
const agree = (a: bigint, b: bigint) => {
  const gap = a > b ? a - b : b - a;
  return gap * 2n ** 98n < (b < 0n ? -b : b);
};

describe("double-doubles", () => {
  test("sum, product, quotient and root are right to 2^−98", () => {
    // Source of the check: exact arithmetic in big integers.
    const random = new SeededRandom(5);
    for (let i = 0; i < 500; i += 1) {
      const draw = (): Pair => pairs.add(pairs.pair(random.next() + 0.1), pairs.pair((random.next() - 0.5) * 2 ** -54));
      const [a, b] = [draw(), draw()];
      expect(agree(exactly(pairs.add(a, b)), exactly(a) + exactly(b))).toBe(true);
      expect(agree(exactly(pairs.multiply(a, b)), (exactly(a) * exactly(b)) / UNIT)).toBe(true);
      expect(agree(exactly(pairs.divide(a, b)), (exactly(a) * UNIT) / exactly(b))).toBe(true);
      const root = exactly(pairs.squareRoot(a));
      expect(agree((root * root) / UNIT, exactly(a))).toBe(true);
    }
  });

  test("exponential and logarithm", () => {
    // Source: e to 40 digits, 2.718281828459045235360287471352662497757 (DLMF 4.2.11).
    const e = BigInt("2718281828459045235360287471352662497757");
    expect(agree(exactly(pairs.exponential([1, 0])), (e * UNIT) / 10n ** 39n)).toBe(true);
    for (const x of [-300.5, -3.7, -1e-9, 0.3, 12.25, 300]) {
      const back = pairs.logarithm(pairs.exponential([x, 0]));
      expect(Math.abs(back[0] - x + back[1])).toBeLessThan(2 ** -95 * Math.max(1, Math.abs(x)));
    }
  });
});

describe("the nonlinearity M(u) = G(1 − u) − 1 + mean u", () => {
  const laws: Offspring[] = [
    { law: "finite", probabilities: [0.1, 0, 0.6, 0.3] },
    { law: "finite", probabilities: [0.2, 0, 0, 0.3, 0, 0, 0, 0, 0, 0.5] },
    { law: "geometric", mean: 1.7 },
    { law: "poisson", mean: 2.3 },
  ];
  const generating = (o: Offspring, s: number) => {
    if (o.law === "geometric") return 1 / (1 + o.mean * (1 - s));
    if (o.law === "poisson") return Math.exp(o.mean * (s - 1));
    return o.probabilities.reduce((sum, p, k) => sum + p * s ** k, 0);
  };

  test.each(laws.map((o) => [o.law, o] as const))("%s: is what its definition says", (_, o) => {
    const law = prepareOffspring(o);
    for (const u of [-0.4, -0.05, 0.05, 0.4, 0.9, 1]) {
      const value = generating(o, 1 - u) - 1 + law.mean[0] * u;
      expect(nonlinearity(law, u).value).toBeCloseTo(value, 12);
      const h = 1e-5;
      const slope = (nonlinearity(law, u + h).value - nonlinearity(law, u - h).value) / (2 * h);
      expect(nonlinearity(law, u).derivative / slope).toBeCloseTo(1, 6);
    }
    // M(u) ~ G''(1) u²/2, which the definition itself cannot show in doubles
    const tiny = nonlinearity(law, 1e-9).value / nonlinearity(law, 1e-5).value;
    expect(tiny * 1e8).toBeCloseTo(1, 3);
  });

  test.each(laws.map((o) => [o.law, o] as const))(
    "%s: of a series, in double-doubles and in complex doubles alike",
    (_, o) => {
      // Source of the check: the two implementations, and M at a point by the definition.
      const law = prepareOffspring(o);
      for (const start of [-0.3, 0.1, 0.8]) {
        const u = [start, 0.2, -0.1, 0.05, 0.01, -0.02, 0.003];
        const fine = new PairSeries(30);
        const plain = complexSeries(30);
        u.forEach((c, k) => {
          fine.set(k, [c, 0]);
          plain.re[k] = c;
        });
        const composeFine = pairComposer(law, fine);
        const composePlain = complexComposer(law, plain);
        const out = { re: 0, im: 0 };
        let sum = 0;
        for (let k = 0; k < 30; k += 1) {
          const c = composeFine(k);
          composePlain(k, out);
          expect(out.re).toBeCloseTo(c[0], 11);
          expect(out.im).toBeCloseTo(0, 15);
          sum += c[0] * 0.2 ** k;
        }
        const at = u.reduce((total, c, k) => total + c * 0.2 ** k, 0);
        expect(sum).toBeCloseTo(nonlinearity(law, at).value, 11);
      }
    },
  );

  test("e^−q − 1 + q keeps its digits", () => {
    // Source: Taylor series, three terms suffice.
    for (const q of [1e-8, -1e-8, 1e-4])
      expect(exponentialRest(q) / (q * q * (0.5 - q / 6 + (q * q) / 24))).toBeCloseTo(1, 13);
    expect(exponentialRest(3)).toBeCloseTo(Math.exp(-3) + 2, 15);
  });

  test("the upper fixed point of a law with mean below 1", () => {
    for (const o of [
      { law: "geometric", mean: 0.4 },
      { law: "poisson", mean: 0.8 },
      { law: "finite", probabilities: [0.6, 0.1, 0.3] },
    ] as Offspring[]) {
      const s = upperFixedPoint(prepareOffspring(o));
      expect(s).toBeGreaterThan(1);
      expect(generating(o, s) / s).toBeCloseTo(1, 14);
    }
  });
});

describe("small parts", () => {
  test.each([1, 2, 5, 16, 33, 250])("Gauss–Legendre with %d nodes is exact to degree 2n − 1", (n) => {
    // Source: elementary; ∫ x^k = 2/(k + 1) for even k.
    const { nodes, weights } = gaussLegendre(n);
    for (const degree of [0, 1, n, 2 * n - 2, 2 * n - 1]) {
      const sum = nodes.reduce((total, x, i) => total + (weights[i] as number) * x ** degree, 0);
      expect(sum).toBeCloseTo(degree % 2 === 0 ? 2 / (degree + 1) : 0, 13);
    }
  });

  test("scaled numbers", () => {
    expect(normalise(12, 0.5, 3)).toEqual({ mantissa: 0.75, exponent: 7, error: 0.5 / 16 });
    expect(normalise(-1, 0, 0).mantissa).toBe(-0.5);
    const log2three = pairs.divide(pairs.logarithm([3, 0]), pairs.LN2);
    // Source: exact; 3^−1000 = mantissa·2^exponent, by big integers.
    const { mantissa, exponent } = scaledByPower(1, 0, log2three, 1000);
    const exact = Number((2n ** BigInt(60 - exponent) * 10n ** 20n) / 3n ** 1000n / 2n ** 60n) / 1e20;
    expect(mantissa / exact).toBeCloseTo(1, 15);
  });

  test("inputs that are exact are known as such", () => {
    for (const x of [2, 0.5, 0.625, 1000, 3.25]) expect(inputUnit(x)).toBe(0);
    for (const x of [0.1, 1.6, Math.SQRT2, 1 / 3]) expect(inputUnit(x)).toBe(2 ** -53);
    expect(lawUnit({ law: "finite", probabilities: [0.5, 0, 0.5] })).toBe(0);
    expect(lawUnit({ law: "finite", probabilities: [0.1, 0, 0.9] })).toBe(2 ** -53);
  });

  test("series of the tail", () => {
    // Source: DLMF 24.2, B_2(x) = x² − x + 1/6, B_4(0) = −1/30.
    expect(bernoulliPolynomials(0.3, 4)[2]).toBeCloseTo(0.09 - 0.3 + 1 / 6, 15);
    expect(bernoulliPolynomials(0, 4)[4]).toBeCloseTo(-1 / 30, 15);
    // y with 2 y² + y³ = 3 r², put back
    const y = inverseSquareRise(Float64Array.of(0, 0, 2, 1), 3, 8);
    const back = composed(Float64Array.of(0, 0, 2, 1), y, 8);
    expect(back[2]).toBeCloseTo(3, 14);
    for (const k of [1, 3, 4, 5, 6, 7, 8]) expect(back[k]).toBeCloseTo(0, 13);
  });
});
