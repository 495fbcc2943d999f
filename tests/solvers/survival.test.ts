import { describe, expect, test } from "vitest";
import type { Estimate, ProcessModel } from "../../app/solvers/index.ts";
import { describeProcess, survivalProbability } from "../../app/solvers/index.ts";

const BINARY = { law: "finite", probabilities: [0, 0, 1] } as const;
const MIXED = { law: "finite", probabilities: [0.1, 0, 0.6, 0.3] } as const;

function model(
  drift: number,
  offspring: ProcessModel["offspring"] = BINARY,
  rate = 1,
  diffusion = 1 / 2,
): ProcessModel {
  return { drift, rate, diffusion, offspring };
}

function survival(of: ProcessModel, x: number): Estimate {
  const answer = survivalProbability(of, x);
  if ("refused" in answer) throw new Error(answer.refused);
  return answer;
}

describe("survival on the half-line", () => {
  test("without drift, binary: the closed form, near the barrier as well as far from it", () => {
    // Source: ½ w″ + w² − w = 0 with w(0) = 1, w(∞) = 0 has w = (1 − h²)/(1 + h/√3)², h = tanh(x/√2); R. A. Fisher's equation
    // at speed 0, solved by its energy. With t = h/√3 and 1 − w written without cancellation.
    for (const x of [1e-9, 1e-4, 0.1, 0.5, 1, 2, 5, 12]) {
      const h = Math.tanh(x / Math.SQRT2);
      const t = h / Math.sqrt(3);
      const exact = (2 * t + t * t + h * h) / (1 + t) ** 2;
      const { value, error } = survival(model(0), x);
      expect(Math.abs(value / exact - 1)).toBeLessThan(1e-14);
      expect(error).toBeLessThan(1e-13 * value);
      expect(Math.abs(value - exact)).toBeLessThanOrEqual(error + 4 * Number.EPSILON * exact);
    }
  });

  test("units: lengths go with √(D/rate), drifts with √(D·rate)", () => {
    const scaled = model(0.7 * Math.sqrt(2 * 0.8 * 2.5), BINARY, 2.5, 0.8);
    for (const x of [0.3, 2]) {
      const plain = survival(model(0.7), x).value;
      expect(survival(scaled, x * Math.sqrt((0.8 * 2) / 2.5)).value).toBeCloseTo(plain, 13);
    }
  });

  // Computed by an independent method: second differences of the answer, against the equation it has to solve.
  const CASES: readonly [string, ProcessModel][] = [
    ["away, binary", model(2)],
    ["away, childless deaths", model(2, MIXED, 0.7, 1.3)],
    ["away, geometric", model(2.5, { law: "geometric", mean: 1.6 })],
    ["between, Poisson", model(-0.4, { law: "poisson", mean: 2 })],
  ];
  for (const [what, of] of CASES) {
    test(`${what}: the equation holds, from 0 at the barrier to the chance without one`, () => {
      const generating = (s: number): number => {
        const { offspring } = of;
        if (offspring.law === "geometric") return 1 / (1 + offspring.mean * (1 - s));
        if (offspring.law === "poisson") return Math.exp(offspring.mean * (s - 1));
        return offspring.probabilities.reduce((sum, p, k) => sum + p * s ** k, 0);
      };
      const h = 1e-3;
      for (const x of [0.05, 0.4, 1, 2.5]) {
        const [left, here, right] = [x - h, x, x + h].map((at) => 1 - survival(of, at).value) as [
          number,
          number,
          number,
        ];
        const second = (right - 2 * here + left) / h ** 2;
        const first = (right - left) / (2 * h);
        const residual = of.diffusion * second + of.drift * first + of.rate * (generating(here) - here);
        expect(Math.abs(residual)).toBeLessThan(4e-5);
      }
      const { extinctionProbability } = describeProcess(of);
      expect(survival(of, 200).value).toBeCloseTo(1 - extinctionProbability.value, 13);
      expect(survival(of, 0)).toEqual({ value: 0, error: 0 });
    });
  }

  test("is 0 where it must be", () => {
    expect(survival(model(2, { law: "geometric", mean: 0.9 }), 3)).toEqual({ value: 0, error: 0 });
    expect(survival(model(-2), 3)).toEqual({ value: 0, error: 0 });
    expect(survival(model(1, { law: "poisson", mean: 1 }), 3)).toEqual({ value: 0, error: 0 });
  });

  test("a start behind the barrier is refused", () => {
    expect(survivalProbability(model(2), -1)).toMatchObject({ refused: expect.stringContaining("begins at 0") });
  });

  test("decreases with the drift towards the barrier, and is no longer found very near the critical one", () => {
    const values = [1, 0, -0.5, -1, -1.3].map((drift) => survival(model(drift), 1).value);
    expect(values).toEqual([...values].sort((a, b) => b - a));
    expect(() => survival(model(-Math.SQRT2 * (1 - 1e-7)), 1)).toThrow("every line is absorbed");
  });
});
