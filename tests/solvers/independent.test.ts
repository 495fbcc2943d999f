import { describe, expect, test } from "vitest";
import { absorbedLaw, absorbedProbability, type ProcessModel, profileConstants } from "../../app/solvers/index.ts";
import { SeededRandom } from "../support/random.ts";
import { given, toDouble } from "./answers.ts";
import { eventOf, relativeError } from "./integrate.ts";
import { binary, references, trajectoryOf } from "./reference.ts";

describe("checks that share no method with the solver", () => {
  /** The extrapolation method's own accuracy over these lengths, its events included. */
  const EXTRAPOLATION = 2e-9;
  /** At the critical drift the two directions are one, and an integration in doubles leaves its path by the square root of its rounding. */
  const AT_CRITICAL = 1e-7;

  test.each(references.map((r) => [r.id, r.model] as const))(
    "%s: the profile equation by extrapolation",
    (id, model) => {
      // Source of the check: computed by an independent method (odex, see integrate.ts).
      const allowed = id.includes("critical") ? AT_CRITICAL : EXTRAPOLATION;
      const constants = profileConstants(trajectoryOf(model));
      const barrier = eventOf(model, 1);
      expect(relativeError(barrier.amplitude, given(constants.amplitude))).toBeLessThan(allowed);
      expect(relativeError(barrier.value, given(constants.slopeAtBarrier))).toBeLessThan(allowed);
      const top = eventOf(model, -1);
      expect(relativeError(top.value, given(constants.s0))).toBeLessThan(allowed);
    },
  );

  test.each([
    ["mean below 1, no drift", { ...binary(0), offspring: { law: "poisson", mean: 0.6 } }],
    ["mean below 1, drift toward the barrier", { ...binary(-0.5), offspring: { law: "geometric", mean: 0.5 } }],
    ["mean 1", { ...binary(0.7), offspring: { law: "finite", probabilities: [0.5, 0, 0.5] } }],
    [
      "up to seven children",
      { ...binary(4), offspring: { law: "finite", probabilities: [0.3, 0.1, 0.2, 0, 0, 0, 0, 0.4] } },
    ],
  ] as [string, ProcessModel][])("%s: the profile equation by extrapolation", (_, model) => {
    // Source of the check: computed by an independent method (odex, see integrate.ts).
    const constants = profileConstants(trajectoryOf(model));
    expect(relativeError(eventOf(model, 1).amplitude, given(constants.amplitude))).toBeLessThan(EXTRAPOLATION);
    expect(relativeError(eventOf(model, -1).value, given(constants.s0))).toBeLessThan(EXTRAPOLATION);
  });

  test("simulated trees give the same law", () => {
    // Source of the check: exact simulation without time step; exponential lifetimes, and the probability e^{−yz/(DT)} that a
    // Brownian bridge from y to z in time T meets 0 (common practice). Lines above 8 are dropped: E K changes by less than 1e-5.
    const random = new SeededRandom(20260701);
    const replicates = 40_000;
    const counts = new Array<number>(200).fill(0);
    for (let r = 0; r < replicates; r += 1) {
      const absorbed = absorbedInTree(random, 0.6, 2, 0.5);
      counts[absorbed] = (counts[absorbed] as number) + 1;
    }
    const t = trajectoryOf(binary(2));
    for (const n of [0, 1, 2, 3]) {
      const p = toDouble(given(absorbedProbability(t, [{ position: 0.6, particles: 1 }], n)));
      const deviation = (counts[n] as number) - replicates * p;
      // five standard deviations: wrong once in two million for a right law; the seed is fixed
      expect(Math.abs(deviation)).toBeLessThan(5 * Math.sqrt(replicates * p * (1 - p)));
    }
  });

  test("the law solves its own differential equation in x", () => {
    // Source: D p_n″ + drift p_n′ + [s^n] f(Σ p_k s^k) = 0, J. Berestycki et al., J. Funct. Anal. 273 (2017) 2107–2143; differences of order 4.
    const model = binary(1.6);
    const t = trajectoryOf(model);
    const h = 0.02;
    const laws = [-2, -1, 0, 1, 2].map((k) => {
      const law = given(absorbedLaw(t, [{ position: 0.9 + k * h, particles: 1 }], 12));
      return law.mantissa.map((m, n) => m * 2 ** (law.exponent[n] as number));
    });
    for (let n = 0; n <= 12; n += 1) {
      const [a, b, c, d, e] = laws.map((law) => law[n] as number) as [number, number, number, number, number];
      const first = (a - 8 * b + 8 * d - e) / (12 * h);
      const second = (-a + 16 * b - 30 * c + 16 * d - e) / (12 * h * h);
      const middle = laws[2] as number[];
      const square = middle.slice(0, n + 1).reduce((sum, p, k) => sum + p * (middle[n - k] as number), 0);
      const terms = Math.abs(0.5 * second) + Math.abs(model.drift * first) + Math.abs(square - c);
      expect(Math.abs(0.5 * second + model.drift * first + square - c)).toBeLessThan(2e-4 * terms);
    }
  });
});

/** K of one binary tree from y, rate 1. */
function absorbedInTree(random: SeededRandom, y: number, drift: number, diffusion: number): number {
  const ceiling = 8;
  const alive = [y];
  let absorbed = 0;
  while (alive.length > 0) {
    const from = alive.pop() as number;
    const time = -Math.log(1 - random.next());
    const normal = Math.sqrt(-2 * Math.log(1 - random.next())) * Math.cos(2 * Math.PI * random.next());
    const to = from + drift * time + Math.sqrt(2 * diffusion * time) * normal;
    if (to <= 0 || random.next() < Math.exp((-from * to) / (diffusion * time))) absorbed += 1;
    else if (to < ceiling) alive.push(to, to);
  }
  return absorbed;
}
