import { describe, expect, test } from "vitest";
import { describeProcess, type Offspring, type ProcessModel, profileAt, SolverError } from "../../app/solvers/index.ts";
import { given, isRefused } from "./answers.ts";
import { binary, trajectoryOf } from "./reference.ts";

const mix: Offspring = { law: "finite", probabilities: [0.1, 0, 0.6, 0.3] };

describe("what is known of a process at once", () => {
  test("binary branching, drift 2, D = 1/2", () => {
    // Source: elementary; f'(1) = 1, critical drift √2, decay = 2 + √2.
    const known = describeProcess(binary(2));
    expect(known.meanOffspring).toEqual({ value: 2, error: 2 ** -52 });
    expect(known.malthusian.value).toBe(1);
    expect(given(known.criticalDrift).value).toBeCloseTo(Math.SQRT2, 15);
    expect(known.regime).toBe("away");
    expect(given(known.decay).value).toBeCloseTo(2 + Math.SQRT2, 14);
    expect(known.farDecay).toEqual(known.decay);
    expect(given(known.limit).value).toBe(1);
    expect(known.extinctionProbability.value).toBe(0);
  });

  test.each([
    [-2, "toward"],
    [-Math.SQRT2, "toward"],
    [-1.41, "between"],
    [0, "between"],
    [1.41, "between"],
    [Math.SQRT2, "away"],
    [3, "away"],
  ] as const)("regime at drift %d", (drift, regime) => {
    expect(describeProcess(binary(drift)).regime).toBe(regime);
  });

  test.each([0.5, 3, 7.1, 11])("the rounding of a critical drift does not decide the regime: rate %d", (rate) => {
    for (const diffusion of [0.3, 0.5, 2.7]) {
      const critical = given(describeProcess({ ...binary(0), rate, diffusion }).criticalDrift).value;
      expect(describeProcess({ ...binary(critical), rate, diffusion }).regime).toBe("away");
      expect(describeProcess({ ...binary(-critical), rate, diffusion }).regime).toBe("toward");
    }
  });

  test("extinction probabilities", () => {
    // Source: elementary roots of G(q) = q: geometric 1/m; {0: 1/4, 2: 3/4} 1/3; Poisson mean 2: 0.20318786997997995 (computed by an independent method: bisection).
    const of = (offspring: Offspring) => describeProcess({ ...binary(5), offspring }).extinctionProbability;
    const geometric = of({ law: "geometric", mean: 2.5 });
    expect(Math.abs(geometric.value - 0.4)).toBeLessThanOrEqual(geometric.error);
    const quarter = of({ law: "finite", probabilities: [0.25, 0, 0.75] });
    expect(Math.abs(quarter.value - 1 / 3)).toBeLessThanOrEqual(quarter.error);
    const poisson = of({ law: "poisson", mean: 2 });
    let [low, high] = [0.1, 0.5];
    for (let k = 0; k < 60; k += 1) {
      const middle = (low + high) / 2;
      if (Math.exp(2 * (middle - 1)) > middle) low = middle;
      else high = middle;
    }
    expect(Math.abs(poisson.value - low)).toBeLessThanOrEqual(poisson.error + 1e-16);
    expect(poisson.error).toBeLessThan(1e-14);
    expect(of({ law: "poisson", mean: 0.7 }).value).toBe(1);
    expect(of({ law: "finite", probabilities: [0, 0.5, 0.5] }).value).toBe(0);
  });

  test("outside away: limit q, its rate from the saddle there, no decay", () => {
    // Source: elementary; binary: q = 0, f'(0) = −1, rate (μ + √(μ² + 2))/(2·1/2).
    const known = describeProcess(binary(-1));
    expect(known.limit).toEqual({ value: 0, error: 0 });
    expect(given(known.farDecay).value).toBeCloseTo(-1 + Math.sqrt(3), 14);
    expect(isRefused(known.decay) && known.decay.refused).toContain("the regime is between");
    const mixed = describeProcess({ ...binary(0.5), offspring: mix });
    const q = given(mixed.limit).value;
    expect(0.1 + 0.6 * q ** 2 + 0.3 * q ** 3).toBeCloseTo(q, 15);
  });

  test("mean offspring below 1: every drift is away, and there is no critical drift", () => {
    for (const drift of [-3, 0, 2]) {
      const known = describeProcess({ ...binary(drift), offspring: { law: "poisson", mean: 0.5 } });
      expect(known.regime).toBe("away");
      expect(isRefused(known.criticalDrift)).toBe(true);
      // Source: elementary; D λ² − drift λ + f'(1) = 0.
      const decay = given(known.decay).value;
      expect(0.5 * decay ** 2 - drift * decay - 0.5).toBeCloseTo(0, 13);
    }
  });

  test("mean offspring 1: away for a drift above 0 with decay drift/D, else refused", () => {
    const critical = (drift: number): ProcessModel => ({
      ...binary(drift),
      offspring: { law: "finite", probabilities: [0.3, 0.4, 0.3] },
    });
    expect(given(describeProcess(critical(0.8)).decay).value).toBeCloseTo(1.6, 15);
    const known = describeProcess(critical(-0.8));
    expect(isRefused(known.regime as object as never)).toBe(true);
    expect(isRefused(known.farDecay)).toBe(true);
    expect(given(known.limit).value).toBe(1);
  });

  test("the profile approaches its limit at the rate stated", () => {
    // Source: definition of farDecay.
    const t = trajectoryOf({ ...binary(2), offspring: mix });
    const { farDecay } = describeProcess({ ...binary(2), offspring: mix });
    const gap = (x: number) => 1 - given(profileAt(t, x, 0)).value;
    expect(Math.log(gap(3) / gap(4))).toBeCloseTo(given(farDecay).value, 3);
  });

  test("misuse throws what was wrong and what is allowed", () => {
    expect(() => describeProcess({ ...binary(2), rate: -1 })).toThrow(SolverError);
    expect(() => describeProcess({ ...binary(2), rate: -1 })).toThrow(
      "The rate is -1; it must be a finite number above 0.",
    );
    expect(() => describeProcess({ ...binary(2), offspring: { law: "finite", probabilities: [0.5, 0.4] } })).toThrow(
      "sum to 0.9; they must sum to 1",
    );
  });
});
