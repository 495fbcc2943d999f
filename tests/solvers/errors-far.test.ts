import { describe, expect, test } from "vitest";
import { absorbedLaw, absorbedProbability } from "../../app/solvers/index.ts";
import { type Decimal, decimal, type ExactModel } from "../../scripts/verify/exact-model.ts";
import { judge } from "../../scripts/verify/judge.ts";
import { ReferenceAnswers } from "../../scripts/verify/reference-answers.ts";
import { singularProbability } from "../../scripts/verify/singular.ts";
import { given } from "./answers.ts";
import { trajectoryOf } from "./reference.ts";

/** What is asked for far out, relative. */
const FAR_OUT = 1e-11;

/** Eighths are doubles exactly: what is judged is the solver, and not how the law follows its inputs' rounding. */
const eighths = (units: number): Decimal => decimal(BigInt(125 * units), 3);

function finite(drift: number, ...probabilities: number[]): ExactModel {
  return {
    drift: eighths(drift),
    rate: eighths(8),
    diffusion: eighths(4),
    offspring: { law: "finite", probabilities: probabilities.map(eighths) },
    model: {
      drift: drift / 8,
      rate: 1,
      diffusion: 0.5,
      offspring: { law: "finite", probabilities: probabilities.map((p) => p / 8) },
    },
  };
}

function familiar(drift: number, law: "geometric" | "poisson", mean: number): ExactModel {
  const base = finite(drift, 8);
  return {
    ...base,
    offspring: { law, mean: eighths(mean) },
    model: { ...base.model, offspring: { law, mean: mean / 8 } },
  };
}

/** In eighths: the drift, then the law. */
const CASES: readonly (readonly [string, ExactModel])[] = [
  ["away, binary", finite(16, 0, 0, 8)],
  ["away, near the critical drift", finite(12, 0, 0, 8)],
  ["away, childless deaths", finite(16, 1, 0, 4, 3)],
  ["away, Poisson", familiar(16, "poisson", 16)],
  ["away, geometric", familiar(11, "geometric", 12)],
  ["away, mean below 1", familiar(-4, "poisson", 6)],
  ["between, binary", finite(4, 0, 0, 8)],
  ["between, drift toward the barrier", finite(-6, 0, 0, 8)],
  ["between, on a lattice", finite(4, 0, 0, 0, 8)],
  ["between, childless deaths", finite(5, 1, 0, 4, 3)],
];

describe("P(K = n) far out, where the law is 10^−70000 and less", () => {
  test.each(CASES)("%s", (_, exact) => {
    // Computed by an independent method: the expansion at s0 in 60 digits, cut at its smallest term (P. Flajolet, A. Odlyzko, SIAM J.
    // Discrete Math. 3 (1990) 216–240), from an integration of the profile equation in as many.
    const t = trajectoryOf(exact.model);
    const reference = new ReferenceAnswers(exact, 80);
    const expansion = reference.singular([{ position: eighths(8), particles: 1 }]);
    if (expansion === null) throw new Error("There is a turning point.");
    let judged = 0;
    for (const n of [1001, 10_001, 100_001]) {
      const truth = singularProbability(reference.f, expansion, n);
      if (truth === null) continue;
      const verdict = judge(given(absorbedProbability(t, [{ position: 1, particles: 1 }], n)), truth);
      expect(verdict.holds).toBe(true);
      expect(verdict.relative).toBeLessThan(FAR_OUT);
      judged += 1;
    }
    expect(judged).toBeGreaterThan(0);
  });

  test("one of all and one alone are the same", () => {
    const t = trajectoryOf(finite(16, 0, 0, 8).model);
    const starts = [{ position: 1, particles: 1 }];
    const law = given(absorbedLaw(t, starts, 10_000));
    for (const n of [1, 10, 100, 1000, 10_000]) {
      const alone = given(absorbedProbability(t, starts, n));
      const scale = 2 ** (alone.exponent - (law.exponent[n] as number));
      const gap = Math.abs((law.mantissa[n] as number) - alone.mantissa * scale);
      expect(gap).toBeLessThanOrEqual((law.error[n] as number) + alone.error * scale);
    }
  });
});
