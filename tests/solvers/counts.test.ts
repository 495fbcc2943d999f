import { describe, expect, test } from "vitest";
import {
  absorbedAbove,
  absorbedLaw,
  absorbedMoments,
  absorbedProbability,
  type Estimate,
  profileAt,
  profileComplementAt,
  type ScaledEstimate,
  SolverError,
  type Starts,
  type Trajectory,
} from "../../app/solvers/index.ts";
import { expectScaledClose, given, relativeGap, toDouble } from "./answers.ts";
import { binary, references, trajectoryOf } from "./reference.ts";

/** What the issue asks for is 1e-10. Where the drift of the reference is no double, its rounding alone moves P(K = 1000) by 4e-13. */
const REACHED = 1e-12;

const one = (position: number): Starts => [{ position, particles: 1 }];

function values(t: Trajectory, starts: Starts, upTo: number): ScaledEstimate[] {
  const law = given(absorbedLaw(t, starts, upTo));
  return law.mantissa.map((mantissa, n) => ({
    mantissa,
    exponent: law.exponent[n] as number,
    error: law.error[n] as number,
  }));
}

describe("the law of the absorbed count against references", () => {
  const laws = references.flatMap((r) => r.laws.map((law) => [`${r.id}, x = ${law.x}`, r, law] as const));

  test.each(laws)("%s: P(K = n) for every n of the reference", (_, r, law) => {
    // Source of the numbers: reference.json, computed by an independent method.
    const t = trajectoryOf(r.model);
    const whole = values(t, one(law.x), 1000);
    for (const [key, value] of Object.entries(law.p)) {
      const n = Number(key);
      if (n <= 1000) expectScaledClose(whole[n] as ScaledEstimate, value, REACHED);
      expectScaledClose(given(absorbedProbability(t, one(law.x), n)), value, 10 * REACHED);
    }
  });

  test.each(references.map((r) => [r.id, r] as const))("%s: the limit law given K > 0", (_, r) => {
    // Source of the numbers: reference.json, computed by an independent method.
    const whole = values(trajectoryOf(r.model), "far", 1000);
    for (const [key, value] of Object.entries(r.limit.p))
      expectScaledClose(whole[Number(key)] as ScaledEstimate, value, REACHED);
    expect(toDouble(whole[0] as ScaledEstimate)).toBe(0);
  });

  test("exact inputs leave a few roundings at n = 1000, where the value is 10^−741", () => {
    // Source of the number: reference.json, computed by an independent method.
    const value = given(absorbedProbability(trajectoryOf(binary(2)), one(1), 1000));
    expect(Math.abs(relativeGap(value, "2.578725245316233394686685e-741"))).toBeLessThan(2e-14);
    expect(value.error / value.mantissa).toBeLessThan(1e-13);
  });
});

describe("identities", () => {
  const cases = references.flatMap((r) => [0.01, 0.2, 1, 6].map((x) => [r.id, x, r] as const));

  test.each(cases)("%s from x = %d: total, mean, and both tails", (_, x, r) => {
    // Source: elementary; Σ p_n = 1, Σ n p_n = e^{−decay x} (J. Berestycki et al., J. Funct. Anal. 273 (2017) 2107–2143), P(K > n) = Σ_{k > n} p_k.
    const t = trajectoryOf(r.model);
    const law = values(t, one(x), 300).map(toDouble);
    const above = (n: number) => toDouble(given(absorbedAbove(t, one(x), n)));
    const survivors = law.slice(1).reduce((a, b) => a + b) + above(300);
    const absorbed = given(profileComplementAt(t, x, 0)).value;
    expect(survivors / absorbed).toBeCloseTo(1, 12);
    expect((above(9) - above(10)) / (law[10] as number)).toBeCloseTo(1, 11);
    expect(above(0) / absorbed).toBeCloseTo(1, 14);
    if (above(300) * 300 < 1e-14 * absorbed) {
      const mean = law.reduce((sum, p, n) => sum + n * p, 0);
      expect(mean / absorbedMoments(t, one(x)).mean.value).toBeCloseTo(1, 12);
    }
  });

  test("the probability generating function at s is w(x, s)", () => {
    // Source: definition of w.
    const t = trajectoryOf(binary(1.5));
    const law = values(t, one(0.7), 400).map(toDouble);
    for (const s of [-1, -0.4, 0.5, 0.9, 1.5]) {
      const sum = law.reduce((total, p, n) => total + p * s ** n, 0);
      expect(sum).toBeCloseTo(given(profileAt(t, 0.7, s)).value, 13);
    }
  });

  test("close to the barrier P(K = n) is proportional to x for n ≠ 1, to full relative accuracy", () => {
    // Source: elementary; w(x, s) − s = x a(s) + O(x²).
    const t = trajectoryOf(binary(2));
    for (const n of [2, 3, 20]) {
      const near = given(absorbedProbability(t, one(1e-7), n));
      const nearer = given(absorbedProbability(t, one(1e-9), n));
      expect(toDouble(near) / toDouble(nearer) / 100).toBeCloseTo(1, 5);
      expect(near.error / near.mantissa).toBeLessThan(1e-12);
    }
    expect(toDouble(given(absorbedProbability(t, one(1e-9), 1)))).toBeCloseTo(1, 7);
  });

  test("far away the law is the limit law times P(K > 0), beyond the range of doubles", () => {
    const t = trajectoryOf(binary(2));
    const limit = given(absorbedProbability(t, "far", 3));
    for (const x of [30, 150, 176, 1000]) {
      const p = given(absorbedProbability(t, one(x), 3));
      const size = given(absorbedProbability(t, one(x), 1));
      const first = given(absorbedProbability(t, "far", 1));
      const ratio = (p.mantissa / size.mantissa) * 2 ** (p.exponent - size.exponent);
      expect(ratio / (toDouble(limit) / toDouble(first))).toBeCloseTo(1, 12);
    }
    expect(given(absorbedProbability(t, one(1000), 1)).exponent).toBeLessThan(-4000);
  });
});

describe("several starts", () => {
  const t = trajectoryOf(binary(1.5));
  const starts: Starts = [
    { position: 1, particles: 3 },
    { position: 2, particles: 2 },
  ];

  test("is the convolution of the single laws", () => {
    // Source: independence of the particles.
    const convolve = (a: number[], b: number[]) =>
      a.map((_, n) => a.slice(0, n + 1).reduce((sum, p, k) => sum + p * (b[n - k] as number), 0));
    const [near, far] = [1, 2].map((x) => values(t, one(x), 40).map(toDouble)) as [number[], number[]];
    const product = [near, near, far, far].reduce(convolve, near);
    values(t, starts, 40).forEach((value, n) => {
      expect(toDouble(value) / (product[n] as number)).toBeCloseTo(1, 12);
    });
  });

  test("the same position may be given twice", () => {
    const twice: Starts = [
      { position: 1, particles: 1 },
      { position: 2, particles: 2 },
      { position: 1, particles: 2 },
    ];
    expect(values(t, twice, 10)).toEqual(values(t, starts, 10));
  });

  test("particles at the barrier count at once", () => {
    const shifted = values(
      t,
      [...(starts as readonly { position: number; particles: number }[]), { position: 0, particles: 4 }],
      12,
    );
    expect(shifted.slice(0, 4).map(toDouble)).toEqual([0, 0, 0, 0]);
    shifted.slice(4).forEach((value, n) => {
      expect(toDouble(value)).toBeCloseTo(toDouble(values(t, starts, 8)[n] as ScaledEstimate), 14);
    });
    expect(values(t, [{ position: 0, particles: 2 }], 3).map(toDouble)).toEqual([0, 0, 1, 0]);
  });

  test("very many particles: the law keeps its relative accuracy where the contour cancels", () => {
    // Source: definition; P(K = 0) = w^200, P(K = 1) = 200 w^199 p_1.
    const many: Starts = [{ position: 1, particles: 200 }];
    const law = values(t, many, 60);
    const w = given(profileAt(t, 1, 0)).value;
    const p1 = toDouble(given(absorbedProbability(t, one(1), 1)));
    expect(toDouble(law[0] as ScaledEstimate) / w ** 200).toBeCloseTo(1, 12);
    expect(toDouble(law[1] as ScaledEstimate) / (200 * w ** 199 * p1)).toBeCloseTo(1, 11);
    for (const value of law) expect(value.error / value.mantissa).toBeLessThan(1e-10);
    const { mean } = absorbedMoments(t, many);
    const above = toDouble(given(absorbedAbove(t, many, 60)));
    expect(law.map(toDouble).reduce((a, b) => a + b) + above).toBeCloseTo(1, 10);
    expect((mean as Estimate).value).toBeCloseTo(200 * Math.exp(-2), 12);
  });
});

describe("laws of other kinds", () => {
  test("without branching it is binomial", () => {
    // Source: elementary; each particle is absorbed with probability e^{−decay x}.
    const t = trajectoryOf({ ...binary(1), offspring: { law: "finite", probabilities: [0, 1] } });
    const law = values(t, [{ position: 0.3, particles: 3 }], 5).map(toDouble);
    const p = Math.exp(-0.6);
    [(1 - p) ** 3, 3 * p * (1 - p) ** 2, 3 * p * p * (1 - p), p ** 3, 0, 0].forEach((value, n) => {
      expect(law[n]).toBeCloseTo(value, 14);
    });
    expect(toDouble(given(absorbedAbove(t, [{ position: 0.3, particles: 3 }], 2)))).toBeCloseTo(p ** 3, 14);
    expect(toDouble(given(absorbedProbability(t, "far", 1)))).toBe(1);
  });

  test("a geometric law whose s0 is not told from its pole still has its law", () => {
    const t = trajectoryOf({ ...binary(20), offspring: { law: "geometric", mean: 2 } });
    const law = values(t, one(0.02), 200);
    const above = toDouble(given(absorbedAbove(t, one(0.02), 200)));
    expect(law.map(toDouble).reduce((a, b) => a + b) + above).toBeCloseTo(1, 13);
    for (const value of law.slice(1)) expect(value.error / value.mantissa).toBeLessThan(1e-9);
  });
});

describe("mean offspring below 1", () => {
  test.each([
    ["drift away", 1.5, { law: "poisson", mean: 0.7 }],
    ["drift toward, turning back beyond the second fixed point", -0.4, { law: "geometric", mean: 0.5 }],
    ["drift toward, ending at the second fixed point", -3, { law: "finite", probabilities: [0.6, 0, 0.4] }],
    ["strong drift toward", -6, { law: "poisson", mean: 0.8 }],
  ] as const)("%s: the law sums to w(x, s)", (_, drift, offspring) => {
    // Source: definition of w; E K = e^{−decay x}.
    const t = trajectoryOf({ ...binary(drift), offspring });
    const law = values(t, one(0.6), 250).map(toDouble);
    const above = toDouble(given(absorbedAbove(t, one(0.6), 250)));
    expect(above).toBeLessThan(1e-13);
    for (const s of [-1, 0, 0.5, 0.99, 1, 1.05]) {
      const sum = law.reduce((total, p, n) => total + p * s ** n, 0);
      expect(sum).toBeCloseTo(given(profileAt(t, 0.6, s)).value, 12);
    }
    const mean = law.reduce((total, p, n) => total + n * p, 0);
    expect(mean / absorbedMoments(t, one(0.6)).mean.value).toBeCloseTo(1, 11);
    for (const p of law) expect(p).toBeGreaterThanOrEqual(0);
  });
});

describe("misuse", () => {
  const t = trajectoryOf(binary(2));
  test.each([
    ["no start", [], 1, "There is no start"],
    ["a negative position", [{ position: -1, particles: 1 }], 1, "A start stands at -1"],
    ["half a particle", [{ position: 1, particles: 0.5 }], 1, "0.5 particles start at 1"],
    ["n that is no integer", [{ position: 1, particles: 1 }], 1.5, "n is 1.5"],
    ["n below 0", [{ position: 1, particles: 1 }], -1, "n is -1"],
  ])("%s", (_, starts, n, words) => {
    expect(() => absorbedProbability(t, starts, n)).toThrow(SolverError);
    expect(() => absorbedProbability(t, starts, n)).toThrow(words);
    expect(() => absorbedAbove(t, starts, n)).toThrow(words);
  });

  test("a whole law of more than a million values", () => {
    expect(() => absorbedLaw(t, one(1), 2_000_000)).toThrow("at most 1000000");
  });
});
