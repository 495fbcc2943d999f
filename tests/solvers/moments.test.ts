import { describe, expect, test } from "vitest";
import {
  absorbedLaw,
  absorbedMoments,
  absorbedProbability,
  factorialMoment,
  profileAt,
  SolverError,
  tailLaw,
  tailProbability,
} from "../../app/solvers/index.ts";
import { expectClose, given, isRefused, toDouble } from "./answers.ts";
import { binary, integrable, references, trajectoryOf } from "./reference.ts";

const REACHED = 1e-14;

describe("moments of the absorbed count", () => {
  const laws = references.flatMap((r) => r.laws.map((law) => [`${r.id}, x = ${law.x}`, r, law] as const));

  test.each(laws)("%s: mean and variance", (_, r, law) => {
    // Source of the numbers: reference.json, computed by an independent method.
    const moments = absorbedMoments(trajectoryOf(r.model), [{ position: law.x, particles: 1 }]);
    expectClose(moments.mean, law.mean, REACHED);
    expectClose(given(moments.variance), law.variance, REACHED);
    expectClose(moments.zero, law.p["0"] as string, REACHED);
  });

  test.each(references.map((r) => [r.id, r] as const))("%s: mean of the limit law is 1/amplitude", (_, r) => {
    // Source of the numbers: reference.json, computed by an independent method.
    const moments = absorbedMoments(trajectoryOf(r.model), "far");
    expectClose(moments.mean, r.limit.mean, REACHED);
    expect(moments.zero.value).toBe(0);
  });

  test.each(references.map((r) => [r.id, r] as const))("%s: factorial moments are sums over the law", (_, r) => {
    // Source: definition, E[K (K − 1) … (K − j + 1)] = Σ n (n − 1) … (n − j + 1) p_n.
    const t = trajectoryOf(r.model);
    for (const starts of [[{ position: 0.8, particles: 1 }], [{ position: 0.5, particles: 3 }], "far"] as const) {
      const law = given(absorbedLaw(t, starts, 1500));
      const p = law.mantissa.map((m, n) => m * 2 ** (law.exponent[n] as number));
      for (const j of [1, 2, 3, 7, 15]) {
        const sum = p.reduce((total, value, n) => {
          let product = value;
          for (let k = 0; k < j; k += 1) product *= n - k;
          return total + product;
        }, 0);
        const moment = given(factorialMoment(t, starts, j));
        expect(sum / moment.value).toBeCloseTo(1, 11);
        expect(moment.error / moment.value).toBeLessThan(1e-11);
      }
    }
  });

  test("independent particles: means and variances add", () => {
    const t = trajectoryOf(binary(2));
    const of = (position: number, particles: number) => absorbedMoments(t, [{ position, particles }]);
    const both = absorbedMoments(t, [
      { position: 1, particles: 3 },
      { position: 0.5, particles: 1 },
    ]);
    expect(both.mean.value).toBeCloseTo(3 * of(1, 1).mean.value + of(0.5, 1).mean.value, 14);
    const spread = 3 * given(of(1, 1).variance).value + given(of(0.5, 1).variance).value;
    expect(given(both.variance).value).toBeCloseTo(spread, 14);
    expect(both.zero.value).toBeCloseTo(of(1, 1).zero.value ** 3 * of(0.5, 1).zero.value, 14);
  });

  test("misuse", () => {
    const t = trajectoryOf(binary(2));
    expect(() => factorialMoment(t, "far", 0)).toThrow(SolverError);
    expect(() => factorialMoment(t, "far", 41)).toThrow("orders from 1 to 40");
  });
});

describe("the tail at s0", () => {
  const laws = references.flatMap((r) => r.laws.map((law) => [`${r.id}, x = ${law.x}`, r, law] as const));

  test.each(laws)("%s: constant, and exact over asymptotic", (_, r, law) => {
    // Source of the numbers: reference.json, computed by an independent method.
    const t = trajectoryOf(r.model);
    const starts = [{ position: law.x, particles: 1 }];
    const tail = given(tailLaw(t, starts, 1));
    expectClose(tail.constant, law.tailConstant, REACHED);
    expectClose(tail.s0, r.s0, REACHED);
    expect(tail.period).toBe(1);
    const slope = r.slopeS0[String(law.x)];
    if (slope !== undefined) expectClose(given(tail.slopeAtStart), slope, 2 * REACHED);
    for (const [n, ratio] of Object.entries(law.ratio)) {
      const exact = given(absorbedProbability(t, starts, Number(n)));
      const { probability } = tailProbability(tail, Number(n));
      const quotient = (exact.mantissa / probability.mantissa) * 2 ** (exact.exponent - probability.exponent);
      expect(quotient / Number(ratio)).toBeCloseTo(1, 13);
    }
  });

  test.each(references.map((r) => [r.id, r] as const))("%s: constant of the limit law", (_, r) => {
    // Source of the number: reference.json, computed by an independent method.
    expectClose(given(tailLaw(trajectoryOf(r.model), "far", 1)).constant, r.limit.tailConstant, REACHED);
  });

  test("the integrable speed has a closed form", () => {
    // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840, for the integrable case; number in reference.json.
    const tail = given(tailLaw(trajectoryOf(binary(5 / (2 * Math.sqrt(3)))), [{ position: 1, particles: 1 }], 1));
    expectClose(tail.constant, integrable.tailConstantAt1, REACHED);
  });

  test("each further term removes one power of n, and the omitted one measures what is left", () => {
    // Source: P. Flajolet, A. Odlyzko, SIAM J. Discrete Math. 3 (1990) 216–240: an asymptotic series in 1/n.
    const t = trajectoryOf(binary(1.5));
    const starts = [{ position: 1, particles: 2 }];
    for (const terms of [1, 2, 3, 4]) {
      const tail = given(tailLaw(t, starts, terms));
      const gaps = [200, 400].map((n) => {
        const exact = given(absorbedProbability(t, starts, n));
        const { probability, omitted } = tailProbability(tail, n);
        const gap = Math.abs(
          exact.mantissa / (probability.mantissa * 2 ** (probability.exponent - exact.exponent)) - 1,
        );
        expect(gap / omitted).toBeGreaterThan(0.5);
        expect(gap / omitted).toBeLessThan(2);
        return gap;
      });
      expect(Math.log2((gaps[0] as number) / (gaps[1] as number))).toBeCloseTo(terms, 0);
    }
  });

  test("at n from ten thousand to a hundred million the law and its expansion are the same number", () => {
    // Source: as above; with 8 terms the omitted one is below 10^−20 there. Two methods that share only s0.
    const t = trajectoryOf(binary(2));
    const starts = [{ position: 1, particles: 1 }];
    const tail = given(tailLaw(t, starts, 8));
    for (const n of [1e4, 1e5, 1e6, 1e8]) {
      const exact = given(absorbedProbability(t, starts, n));
      const { probability } = tailProbability(tail, n);
      expect(probability.exponent).toBe(exact.exponent);
      expect(probability.mantissa / exact.mantissa).toBeCloseTo(1, 14);
    }
  });

  test("of several particles: the constant is that of one times what the others contribute at s0", () => {
    // Source: elementary; the singular part of w^m at s0 is m w(x, s0)^{m − 1} times that of w.
    const t = trajectoryOf(binary(2));
    const single = given(tailLaw(t, [{ position: 1, particles: 1 }], 1));
    const five = given(tailLaw(t, [{ position: 1, particles: 5 }], 1));
    const w = given(profileAt(t, 1, single.s0.value)).value;
    expect(five.constant.value / (5 * w ** 4 * single.constant.value)).toBeCloseTo(1, 13);
    expect(isRefused(five.slopeAtStart)).toBe(true);
  });

  test("what has no such tail is refused", () => {
    const sterile = trajectoryOf({ ...binary(1), offspring: { law: "finite", probabilities: [0, 1] } });
    const answer = tailLaw(sterile, [{ position: 1, particles: 1 }], 1);
    expect(isRefused(answer) && answer.refused).toContain("no tail");
    const certain = tailLaw(trajectoryOf(binary(2)), [{ position: 0, particles: 1 }], 1);
    expect(isRefused(certain) && certain.refused).toContain("K is certain");
  });

  test("misuse", () => {
    const t = trajectoryOf(binary(2));
    expect(() => tailLaw(t, "far", 11)).toThrow("from 1 to 10");
    const tail = given(tailLaw(t, "far", 1));
    expect(() => tailProbability(tail, 0)).toThrow("n = 0");
    expect(toDouble(tailProbability(tail, 1).probability)).toBeGreaterThan(0);
  });
});
