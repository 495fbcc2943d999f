import { describe, expect, test } from "vitest";
import {
  absorbedAbove,
  absorbedLaw,
  absorbedMoments,
  absorbedProbability,
  describeProcess,
  factorialMoment,
  type Offspring,
  type ProcessModel,
  profileAt,
  profileComplementAt,
  profileConstants,
  profileSlopeAt,
  type Start,
} from "../../app/solvers/index.ts";
import { expectClose, expectScaledClose, given, isRefused, scaledAt, toDouble } from "./answers.ts";
import { lawByRecursion } from "./recursion.ts";
import { binary, trajectoryOf } from "./reference.ts";
import stored from "./reference-toward.json" with { type: "json" };

interface TowardEntry {
  readonly id: string;
  readonly model: ProcessModel;
  readonly limit: string;
  readonly farDecay: string;
  /** w(1, s) by s */
  readonly w: Readonly<Record<string, string>>;
  readonly mean: string;
  readonly index: string;
  readonly p: Readonly<Record<string, string>>;
}

const entries = stored.entries as unknown as readonly TowardEntry[];
const one = (position: number): Start[] => [{ position, particles: 1 }];
const finite = (...probabilities: number[]): Offspring => ({ law: "finite", probabilities });
/** Where everything is explicit: d = 3/2. */
const EXPLICIT = binary(-5 / (2 * Math.sqrt(3)));

describe("against references to 25 digits, one particle at 1", () => {
  test.each(entries)("$id", (entry) => {
    const t = trajectoryOf(entry.model);
    const description = describeProcess(entry.model);
    expectClose(given(description.farDecay), entry.farDecay, 1e-14);
    if (Number(entry.limit) > 0) expectClose(given(description.limit), entry.limit, 1e-14);
    // what the drift −√2 rounds to is beyond the critical one by less than its own rounding
    if (entry.index !== "1.0")
      expect(Math.abs(Number(t.passage?.index[0]) / Number(entry.index) - 1)).toBeLessThan(1e-14);
    for (const [s, w] of Object.entries(entry.w)) expectClose(given(profileAt(t, 1, Number(s))), w, 1e-13);
    const law = given(absorbedLaw(t, one(1), 1000));
    for (const [n, p] of Object.entries(entry.p)) {
      expectScaledClose(scaledAt(law, Number(n)), p, 1e-12);
      expectScaledClose(given(absorbedProbability(t, one(1), Number(n))), p, 1e-12);
    }
    const { mean, infinite } = absorbedMoments(t, one(1));
    expectClose(given(mean), entry.mean, 1e-13);
    expect(infinite).toEqual({ value: 0, error: 0 });
  });
});

/** Exact as doubles, so that the recursion solves the same problem. */
const RECURSED: readonly [
  string,
  { drift: number; rate: number; diffusion: number; probabilities: number[] },
  number,
][] = [
  ["d = 16, near the barrier", { drift: -3, rate: 1, diffusion: 0.5, probabilities: [0, 0, 1] }, 0.125],
  ["d = 30", { drift: -4, rate: 1, diffusion: 0.5, probabilities: [0, 0, 1] }, 2],
  ["d = 2, far out", { drift: -1.5, rate: 1, diffusion: 0.5, probabilities: [0, 0, 1] }, 3.5],
  ["just beyond the critical drift", { drift: -1.4375, rate: 1, diffusion: 0.5, probabilities: [0, 0, 1] }, 0.25],
  ["1, 2 or 3 children", { drift: -3.5, rate: 1.5, diffusion: 0.75, probabilities: [0, 0.25, 0.5, 0.25] }, 1],
  ["3 or 5 children", { drift: -5, rate: 1.25, diffusion: 0.5, probabilities: [0, 0, 0, 0.75, 0, 0.25] }, 0.75],
];

describe("against the exact recursion in 100 digits", () => {
  test.each(RECURSED)("%s", (_name, exact, x) => {
    const t = trajectoryOf({ ...exact, offspring: finite(...exact.probabilities) });
    const law = given(absorbedLaw(t, one(x), 160));
    const recursed = lawByRecursion(exact, x, 160);
    for (let n = 1; n <= 160; n += 1) {
      const ours = scaledAt(law, n);
      if (ours.mantissa === 0) expect(recursed[n]).toMatch(/^-?\d{0,9}e/);
      else expectScaledClose(ours, recursed[n] as string, 1e-9);
    }
  });

  test("where the law falls faster than doubles can follow, no digit is claimed that does not hold", {
    timeout: 60_000,
  }, () => {
    for (const drift of [-8, -12, -26, -100]) {
      const exact = { drift, rate: 1, diffusion: 0.5, probabilities: [0, 0, 1] };
      const law = given(absorbedLaw(trajectoryOf(binary(drift)), one(1), 60));
      const recursed = lawByRecursion(exact, 1, 60);
      let known = 0;
      for (let n = 1; n <= 60; n += 1) {
        const { mantissa, exponent, error } = scaledAt(law, n);
        const size = 2 ** exponent;
        expect(Math.abs(mantissa * size - Number(recursed[n]))).toBeLessThanOrEqual(error * size);
        if (error < 1e-6 * mantissa) known += 1;
      }
      expect(known).toBeGreaterThanOrEqual(5);
    }
  });
});

test("where the law is explicit: w(x, s) = 1 − (1 − s)/(ρ + (1 − ρ) √(1 − s))², ρ = e^{−x/√3}", () => {
  // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840, their front run backwards.
  const t = trajectoryOf(EXPLICIT);
  for (const x of [0, 1e-3, 0.4, 1, 3, 12]) {
    const rho = Math.exp(-x / Math.sqrt(3));
    for (const gap of [2, 1.25, 1, 0.75, 2 ** -3, 2 ** -10, 2 ** -32]) {
      const u = gap / (rho + (1 - rho) * Math.sqrt(gap)) ** 2;
      const ours = given(profileComplementAt(t, x, 1 - gap));
      expect(Math.abs(ours.value - u)).toBeLessThanOrEqual(ours.error + 4e-16 * u);
      // s = 1 − gap is itself known to half a unit in its last place
      const own = 2 ** -53 / gap;
      expect(ours.error).toBeLessThan(1e-13 * (1 + u) + (gap < 0.1 ? own * u : 1e-12));
      const slope = (-2 * gap * (1 - Math.sqrt(gap)) * rho) / Math.sqrt(3) / (rho + (1 - rho) * Math.sqrt(gap)) ** 3;
      const wSlope = given(profileSlopeAt(t, x, 1 - gap));
      expect(Math.abs(wSlope.value - slope)).toBeLessThanOrEqual(wSlope.error + 1e-15 * Math.abs(slope));
      expect(wSlope.error).toBeLessThan(1e-11 + 3 * own * Math.abs(slope));
    }
  }
  expect(given(profileAt(t, 1, 1))).toEqual({ value: 1, error: 0 });
});

const CASES: readonly [string, ProcessModel][] = [
  ["critical", binary(-Math.SQRT2)],
  ["ternary", { ...binary(-2.2), offspring: finite(0, 0, 0, 1) }],
  ["childless deaths", { drift: -2.6, rate: 1.3, diffusion: 0.7, offspring: finite(0.1, 0, 0.6, 0.3) }],
  ["childless deaths, critical", { ...binary(-1), offspring: finite(0.25, 0, 0.75) }],
  ["hardly any childless deaths", { ...binary(-1.6), offspring: finite(1e-9, 0, 1 - 1e-9) }],
  ["Poisson", { ...binary(-1.7), offspring: { law: "poisson", mean: 2 } }],
  ["geometric", { ...binary(-2.1), offspring: { law: "geometric", mean: 1.8 } }],
  ["nearly critical mean", { ...binary(-0.25), offspring: { law: "geometric", mean: 1.02 } }],
  ["small diffusion", { drift: -0.1, rate: 1, diffusion: 1e-3, offspring: finite(0, 0, 1) }],
  ["large diffusion", { drift: -60, rate: 0.7, diffusion: 900, offspring: finite(0.2, 0, 0.5, 0.3) }],
];
/** Starts in units in which the mean of K from 1 is e^{1/2}. */
const unitOf = (model: ProcessModel) => 0.5 / Number(trajectoryOf(model).passage?.slow[0]);

describe.each(CASES)("%s", (_name, model) => {
  const t = trajectoryOf(model);
  const unit = unitOf(model);
  const crowd: Start[] = [
    { position: 0.5 * unit, particles: 3 },
    { position: 1.5 * unit, particles: 2 },
  ];

  test("the flow is a semigroup: w(x + y, s) = w(x, w(y, s)), also next to s = 1", () => {
    for (const s of [-0.9, 0, 0.3, 0.8, 0.99, 1 - 1e-6]) {
      const inner = given(profileAt(t, 0.6 * unit, s)).value;
      const whole = given(profileComplementAt(t, 1.3 * unit, s)).value;
      const back = given(profileComplementAt(t, 0.7 * unit, inner)).value;
      expect(Math.abs(back - whole)).toBeLessThan(3e-14);
    }
  });

  test.each([
    ["one", one(unit)],
    ["one, near", one(0.02 * unit)],
    ["one, far", one(5 * unit)],
    ["several", crowd],
  ] as const)("the law sums to 1 with its tail, and gives w: %s", (_which, starts) => {
    const law = given(absorbedLaw(t, starts, 500));
    const p = law.mantissa.map((m, n) => m * 2 ** (law.exponent[n] as number));
    let below = 0;
    for (const [n, value] of p.entries()) {
      below += value;
      if (n !== 7 && n !== 8 && n !== 500) continue;
      const above = given(absorbedAbove(t, starts, n));
      expect(Math.abs(below + toDouble(above) - 1)).toBeLessThan(2e-12);
    }
    for (const s of [-0.9, 0.5, 0.9]) {
      const sum = p.reduceRight((total, value) => total * s + value, 0);
      const w = starts.reduce((all, k) => all * given(profileAt(t, k.position, s)).value ** k.particles, 1);
      expect(Math.abs(sum - w)).toBeLessThan(2e-13);
    }
    const worst = Math.max(...law.mantissa.map((m, n) => (m > 0 ? (law.error[n] as number) / m : 0)));
    expect(worst).toBeLessThan(1e-9);
  });

  test("mean, variance and factorial moments below the tail index are those of the law", () => {
    const d = Number(t.passage?.index[0]);
    const moments = absorbedMoments(t, crowd);
    const slow = Number(t.passage?.slow[0]);
    const mean = crowd.reduce((sum, { position, particles }) => sum + particles * Math.exp(slow * position), 0);
    expect(given(moments.mean).value / mean).toBeCloseTo(1, 13);
    expect(isRefused(moments.variance)).toBe(d <= 2);
    for (const j of [1, 2, 3, 5]) expect(isRefused(factorialMoment(t, crowd, j))).toBe(j >= d);
    if (d < 6) return;
    const law = given(absorbedLaw(t, crowd, 5000));
    const p = law.mantissa.map((m, n) => m * 2 ** (law.exponent[n] as number));
    const sum = (of: (n: number) => number) => p.reduce((total, value, n) => total + value * of(n), 0);
    expect(given(moments.variance).value / sum((n) => (n - mean) ** 2)).toBeCloseTo(1, 10);
    expect(given(factorialMoment(t, crowd, 3)).value / sum((n) => n * (n - 1) * (n - 2))).toBeCloseTo(1, 8);
  });
});

describe("beside the law itself", () => {
  test("particles at the barrier count at once, and K keeps to its lattice", () => {
    const t = trajectoryOf({ ...binary(-2.2), offspring: finite(0, 0, 0, 1) });
    const starts: Start[] = [
      { position: 0, particles: 2 },
      { position: 1, particles: 1 },
    ];
    const law = given(absorbedLaw(t, starts, 20));
    expect(law.mantissa.map((m) => m > 0)).toEqual(Array.from({ length: 21 }, (_, n) => n >= 3 && n % 2 === 1));
    expect(toDouble(scaledAt(law, 5)) / toDouble(given(absorbedProbability(t, one(1), 3)))).toBeCloseTo(1, 14);
    expect(toDouble(given(absorbedAbove(t, starts, 2)))).toBe(1);
    expect(toDouble(given(absorbedAbove(t, starts, 4)))).toBe(toDouble(given(absorbedAbove(t, starts, 3))));
  });

  test("several particles are convolved from one", () => {
    const t = trajectoryOf(EXPLICIT);
    const single = given(absorbedLaw(t, one(1), 60));
    const three = given(absorbedLaw(t, [{ position: 1, particles: 3 }], 60));
    const p = single.mantissa.map((m, n) => m * 2 ** (single.exponent[n] as number));
    const convolve = (a: number[], b: number[]) =>
      a.map((_, n) => a.slice(0, n + 1).reduce((sum, value, k) => sum + value * (b[n - k] as number), 0));
    const expected = convolve(convolve(p, p), p);
    for (let n = 3; n <= 60; n += 1) expect(toDouble(scaledAt(three, n)) / (expected[n] as number)).toBeCloseTo(1, 12);
  });

  test("s0 is 1, the limit is q, and what belongs to other regimes is refused with the reason", () => {
    const t = trajectoryOf({ ...binary(-2), offspring: finite(0.25, 0, 0.75) });
    const { s0, limit, amplitude, decay, slopeAtBarrier } = profileConstants(t);
    expect(s0).toEqual({ value: 1, error: 0 });
    // Source: 3 q² − 4 q + 1 = 0.
    expect(Math.abs(limit.value - 1 / 3)).toBeLessThanOrEqual(limit.error);
    expect(given(slopeAtBarrier).value).toBeGreaterThan(0);
    for (const answer of [amplitude, decay, absorbedLaw(t, "far", 10)] as const)
      expect(isRefused(answer) && answer.refused).toContain("the regime is toward");
    const beyond = profileAt(t, 1, 1.001);
    expect(isRefused(beyond) && beyond.refused).toContain("infinite for every s above 1");
    const variance = absorbedMoments(trajectoryOf(EXPLICIT), one(1)).variance;
    expect(isRefused(variance) && variance.refused).toContain("d = 1.5");
  });

  test("d = 2 and d = 4 exactly: the moment of that order is infinite", () => {
    // Source: drift −3/2 and −5/2 (ternary) have the rates 1, 2 and 1, 4.
    expect(isRefused(absorbedMoments(trajectoryOf(binary(-1.5)), one(1)).variance)).toBe(true);
    const ternary = trajectoryOf({ ...binary(-2.5), offspring: finite(0, 0, 0, 1) });
    expect(isRefused(factorialMoment(ternary, one(1), 3))).toBe(false);
    expect(isRefused(factorialMoment(ternary, one(1), 4))).toBe(true);
  });

  test("the trajectory is plain JSON, and small", () => {
    const t = trajectoryOf(binary(-2));
    const text = JSON.stringify(t);
    expect(JSON.parse(text)).toEqual(t);
    expect(text.length).toBeLessThan(6000);
  });
});

describe("mean below 1 and a drift strongly toward the barrier, where the damping is strong", () => {
  test.each([
    ["0.99", { ...binary(-5), offspring: { law: "poisson", mean: 0.99 } }],
    ["0.5", { ...binary(-30), offspring: finite(0.75, 0, 0.25) }],
  ] as const)("mean %s: the law sums to 1 with its tail, and gives w and the mean", (_name, model) => {
    const t = trajectoryOf(model);
    const law = given(absorbedLaw(t, one(1), 40));
    const p = law.mantissa.map((m, n) => m * 2 ** (law.exponent[n] as number));
    const total = p.reduce((sum, value) => sum + value, toDouble(given(absorbedAbove(t, one(1), 40))));
    expect(Math.abs(total - 1)).toBeLessThan(1e-9);
    for (const s of [-0.5, 0, 0.9]) {
      const sum = p.reduceRight((all, value) => all * s + value, 0);
      expect(Math.abs(sum - given(profileAt(t, 1, s)).value)).toBeLessThan(1e-9);
    }
    const { mean } = absorbedMoments(t, one(1));
    const summed = p.reduce((sum, value, n) => sum + n * value, 0);
    expect(Math.abs(summed - mean.value)).toBeLessThan(1e-9);
  });
});

describe("drifts strongly toward the barrier, laws with gaps, and a trajectory met at an unlucky place", () => {
  // In each of them the series at w = 1 once was trusted too far, or the circle met a complex root of G(w) = w.
  test.each([
    ["binary, drift −2.5", binary(-2.5)],
    ["binary, drift −34.5", binary(-34.5)],
    ["geometric, drift −1.58", { ...binary(-1.58), offspring: { law: "geometric", mean: 2 } }],
    ["with deaths, drift −10.7", { ...binary(-10.7), offspring: finite(0.3, 0, 0.7) }],
    ["Poisson, drift −9.63", { ...binary(-9.63), offspring: { law: "poisson", mean: 1.2 } }],
    ["Poisson of mean 5, drift −22.6", { ...binary(-22.6), offspring: { law: "poisson", mean: 5 } }],
    ["none or 6 children, drift −6.29", { ...binary(-6.29), offspring: finite(0.4, 0, 0, 0, 0, 0, 0.6) }],
    ["none or 6 children, drift −30", { ...binary(-30), offspring: finite(0.4, 0, 0, 0, 0, 0, 0.6) }],
  ] as const)("%s: total 1 and mean e^{λx} within the errors", (_name, model) => {
    const t = trajectoryOf(model);
    const law = given(absorbedLaw(t, one(1), 300));
    let [total, mean, error] = [0, 0, 0];
    for (let n = 0; n <= 300; n += 1) {
      const size = 2 ** (law.exponent[n] as number);
      total += (law.mantissa[n] as number) * size;
      mean += n * (law.mantissa[n] as number) * size;
      error += n * (law.error[n] as number) * size;
    }
    const above = given(absorbedAbove(t, one(1), 300));
    total += above.mantissa * 2 ** above.exponent;
    const zero = (law.error[0] as number) * 2 ** (law.exponent[0] as number) + above.error * 2 ** above.exponent;
    expect(Math.abs(total - 1)).toBeLessThanOrEqual(error + zero + 1e-13);
    // Source: the many-to-one formula, E K = e^{λ x} with λ the smaller root of D λ² + drift λ + rate (mean − 1) = 0.
    const described = describeProcess(model);
    const root = Math.sqrt(model.drift ** 2 - 4 * model.diffusion * described.malthusian.value);
    const expected = Math.exp((-model.drift - root) / (2 * model.diffusion));
    // beyond 300 there is at most what a falling law leaves
    const beyond = 1000 * Math.abs(above.mantissa) * 2 ** above.exponent;
    expect(Math.abs(mean - expected)).toBeLessThanOrEqual(error + beyond + 1e-12);
    expect(error).toBeLessThan(1e-4);
  });
});
