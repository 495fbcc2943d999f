import { describe, expect, test } from "vitest";
import { logGamma } from "../../app/solvers/gamma.ts";
import {
  absorbedAbove,
  absorbedLaw,
  absorbedMoments,
  absorbedProbability,
  type Offspring,
  type ProcessModel,
  profileComplementAt,
  type ScaledEstimate,
  type Start,
  tailLaw,
  tailProbability,
} from "../../app/solvers/index.ts";
import { SeededRandom } from "../support/random.ts";
import { given, isRefused, scaledAt, toDouble } from "./answers.ts";
import { binary, trajectoryOf } from "./reference.ts";

const one = (position: number): Start[] => [{ position, particles: 1 }];
const finite = (...probabilities: number[]): Offspring => ({ law: "finite", probabilities });
const over = (a: ScaledEstimate, b: ScaledEstimate) => (a.mantissa / b.mantissa) * 2 ** (a.exponent - b.exponent);
/** Exact law over asymptotic law, less 1. */
function gapAt(model: ProcessModel, starts: Start[], n: number): { gap: number; omitted: number } {
  const t = trajectoryOf(model);
  const { probability, omitted } = tailProbability(given(tailLaw(t, starts, 1)), n);
  return { gap: over(given(absorbedProbability(t, starts, n)), probability) - 1, omitted };
}

test("ln Γ", () => {
  // Source: Γ(1/2) = √π, Γ(5) = 24, DLMF 5.4.6; Γ(x + 1) = x Γ(x), 5.5.1.
  expect(logGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 14);
  expect(logGamma(5)).toBeCloseTo(Math.log(24), 14);
  for (const x of [0.01, 1.7, 11.9, 12.1, 170.3]) expect(logGamma(x + 1) - logGamma(x)).toBeCloseTo(Math.log(x), 12);
});

describe("the power law", () => {
  test("where the law is explicit, d = 3/2: constant (3/2) (1 − ρ) ρ^−3 π^−1/2, ρ = e^{−x/√3}", () => {
    // Source: derived from M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840.
    const t = trajectoryOf(binary(-5 / (2 * Math.sqrt(3))));
    for (const x of [1e-3, 0.3, 1, 4]) {
      const rho = Math.exp(-x / Math.sqrt(3));
      const expected = (1.5 * -Math.expm1(-x / Math.sqrt(3))) / (rho ** 3 * Math.sqrt(Math.PI));
      const { constant, exponent, kind, s0 } = given(tailLaw(t, one(x), 1));
      expect(kind).toBe("power");
      expect(s0).toEqual({ value: 1, error: 0 });
      expect(Math.abs(given(exponent).value - 1.5)).toBeLessThanOrEqual(given(exponent).error);
      expect(Math.abs(constant.value - expected)).toBeLessThanOrEqual(constant.error + 1e-15 * expected);
      expect(constant.error / constant.value).toBeLessThan(1e-12);
    }
  });

  test.each([
    ["d = 5.8", binary(-2), 1e6],
    ["d = 16", binary(-3), 1e6],
    ["d = 48", binary(-5), 1e7],
    ["d = 2, an integer", binary(-1.5), 1e7],
    ["d = 4, an integer, on a lattice", { ...binary(-2.5), offspring: finite(0, 0, 0, 1) }, 1e6 + 1],
    ["d = 1.2", binary(-1.42), 1e9],
    ["childless deaths", { ...binary(-2), offspring: finite(0.1, 0, 0.6, 0.3) }, 1e6],
    ["Poisson", { ...binary(-1.9), offspring: { law: "poisson", mean: 2 } }, 1e6],
    ["geometric", { ...binary(-1.1), offspring: { law: "geometric", mean: 1.5 } }, 1e6],
  ] as const)("%s: the exact law comes to it, off by what it omits", (_name, model, n) => {
    const { gap, omitted } = gapAt(model, one(1), n);
    expect(Math.abs(gap)).toBeLessThan(1.5 * omitted + 1e-12);
    expect(Math.abs(gap)).toBeGreaterThan(omitted / 4);
    expect(Math.abs(gap)).toBeLessThan(0.05);
  });

  test("the constant passes through an integer d without a jump", () => {
    // Source: the law is continuous in the drift.
    const at = (drift: number) => given(tailLaw(trajectoryOf(binary(drift)), one(1), 1)).constant.value;
    for (const drift of [-1.5, -Math.SQRT2 * (2 / Math.sqrt(3))])
      for (const by of [1e-9, 1e-5]) {
        const [below, middle, above] = [at(drift * (1 - by)), at(drift), at(drift * (1 + by))];
        expect(Math.abs(below - 2 * middle + above) / middle).toBeLessThan(1e4 * by * by + 1e-11);
        expect(Math.abs(above / below - 1)).toBeLessThan(200 * by);
      }
  });

  test("of several particles one alone reaches a large n: constants add", () => {
    const t = trajectoryOf(binary(-2));
    const of = (starts: Start[]) => given(tailLaw(t, starts, 1)).constant.value;
    const crowd = [
      { position: 1, particles: 3 },
      { position: 2, particles: 1 },
    ];
    expect(of(crowd) / (3 * of(one(1)) + of(one(2)))).toBeCloseTo(1, 13);
    expect(Math.abs(gapAt(binary(-2), crowd, 1e6).gap)).toBeLessThan(1e-3);
  });

  test("at the critical drift the logarithmic law λ x e^{λx}/(n log n)² is stated", () => {
    // Source: P. Maillard, Ann. Inst. H. Poincaré Probab. Stat. 49 (2013) 428–455; corrections are of the order 1/log n.
    const t = trajectoryOf(binary(-Math.SQRT2));
    const law = given(tailLaw(t, one(1), 1));
    expect(law.kind).toBe("logarithmic");
    expect(given(law.exponent).value).toBe(1);
    expect(Math.abs(law.constant.value / (Math.SQRT2 * Math.exp(Math.SQRT2)) - 1)).toBeLessThan(1e-14);
    const gaps = [1e4, 1e6, 1e8].map((n) => gapAt(binary(-Math.SQRT2), one(1), n));
    for (const { gap, omitted } of gaps) expect(Math.abs(gap)).toBeLessThan(omitted);
    expect(tailProbability(law, 100).probability.mantissa).toBeGreaterThan(0);
  });

  test("what it does not give is refused with the reason", () => {
    const t = trajectoryOf(binary(-2));
    const terms = tailLaw(t, one(1), 2);
    expect(isRefused(terms) && terms.refused).toContain("the leading term alone");
    const none = tailLaw(t, one(0), 1);
    expect(isRefused(none) && none.refused).toContain("absorbed at once");
    const lost = tailLaw(trajectoryOf(binary(-15)), one(1), 1);
    expect(isRefused(lost) && lost.refused).toContain("lost in rounding");
    const square = given(tailLaw(trajectoryOf(binary(2)), one(1), 1));
    expect(isRefused(square.exponent) && square.exponent.refused).toContain("no power of n");
  });
});

test("P(K > n) at large n is what the power law leaves: Σ_{k > n} c k^{−1−d} ~ c n^{−d}/d", () => {
  const t = trajectoryOf(binary(-2));
  const law = given(tailLaw(t, one(1), 1));
  const d = given(law.exponent).value;
  const n = 1e7;
  expect(toDouble(given(absorbedAbove(t, one(1), n))) / ((law.constant.value * n ** -d) / d)).toBeCloseTo(1, 4);
});

test("errors hold against inputs moved within their rounding, and are no caricature", { timeout: 60_000 }, () => {
  // Computed by an independent method: the same numbers of models whose inputs are moved 2^20 times further.
  const random = new SeededRandom(20261203);
  let judged = 0;
  let caricatures = 0;
  for (let k = 0; k < 12; k += 1) {
    const mean = 1.3 + random.next();
    const offspring: Offspring =
      k % 3 === 0 ? { law: "poisson", mean } : k % 3 === 1 ? { law: "geometric", mean } : finite(0.1, 0, 0.6, 0.3);
    const rate = 0.5 + random.next();
    const excess = k % 3 === 2 ? 1.1 : mean - 1;
    const drift = -(1.01 + 1.2 * random.next()) * Math.sqrt(2 * rate * excess);
    const model: ProcessModel = { drift, rate, diffusion: 0.5, offspring };
    const law = offspring.law === "finite" ? offspring : { ...offspring, mean: mean * (1 - 2 ** -33) };
    const moved = { ...model, drift: drift * (1 + 2 ** -33), rate: rate * (1 - 2 ** -33), offspring: law };
    const [t, u] = [trajectoryOf(model), trajectoryOf(moved)];
    const judge = (value: number, other: number, error: number) => {
      const gap = Math.abs(value - other) / 2 ** 20;
      expect(gap).toBeLessThanOrEqual(error);
      judged += 1;
      if (error > 1000 * gap + 1e-13 * Math.abs(value)) caricatures += 1;
    };
    for (const s of [0, 0.9, 0.999]) {
      const [a, b] = [given(profileComplementAt(t, 1, s)), given(profileComplementAt(u, 1, s))];
      judge(a.value, b.value, a.error);
    }
    const [a, b] = [absorbedMoments(t, one(1)).mean, absorbedMoments(u, one(1)).mean];
    judge(a.value, b.value, a.error);
    const [c, e] = [given(tailLaw(t, one(1), 1)).constant, given(tailLaw(u, one(1), 1)).constant];
    judge(c.value, e.value, c.error);
    const [p, q] = [given(absorbedLaw(t, one(1), 1000)), given(absorbedLaw(u, one(1), 1000))];
    for (const n of [1, 10, 100, 1000]) {
      const at = scaledAt(p, n);
      judge(at.mantissa, at.mantissa * over(scaledAt(q, n), at), at.error);
    }
  }
  expect(judged).toBe(108);
  expect(caricatures).toBeLessThan(30);
});
