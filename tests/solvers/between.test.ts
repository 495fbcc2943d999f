import { describe, expect, test } from "vitest";
import {
  absorbedAbove,
  absorbedLaw,
  absorbedMoments,
  absorbedProbability,
  factorialMoment,
  type Offspring,
  type ProcessModel,
  profileAt,
  profileConstants,
  type Start,
  survivalProbability,
  tailLaw,
  tailProbability,
} from "../../app/solvers/index.ts";
import { SeededRandom } from "../support/random.ts";
import { expectClose, expectScaledClose, given, isRefused, toDouble } from "./answers.ts";
import { binary, trajectoryOf } from "./reference.ts";
import stored from "./reference-between.json" with { type: "json" };

interface BetweenEntry {
  readonly id: string;
  readonly model: ProcessModel;
  readonly s0: string;
  /** P(K finite) by x */
  readonly finite: Readonly<Record<string, string>>;
  /** w(1, s) by s */
  readonly w: Readonly<Record<string, string>>;
  readonly mean: string;
  readonly tailConstant: string;
  readonly ratio: Readonly<Record<string, string>>;
  readonly p: Readonly<Record<string, string>>;
}

const entries = stored.entries as unknown as readonly BetweenEntry[];
const one = (position: number): Start[] => [{ position, particles: 1 }];
const finite = (...probabilities: number[]): Offspring => ({ law: "finite", probabilities });
const ternary = finite(0, 0, 0, 1);
const mixed = finite(0.1, 0, 0.6, 0.3);

describe("against references to 25 digits, one particle at 1", () => {
  test.each(entries)("$id", (entry) => {
    const t = trajectoryOf(entry.model);
    expectClose(given(profileConstants(t).s0), entry.s0, 1e-14);
    for (const [x, w] of Object.entries(entry.finite)) expectClose(given(profileAt(t, Number(x), 1)), w, 1e-13);
    for (const [s, w] of Object.entries(entry.w)) expectClose(given(profileAt(t, 1, Number(s))), w, 1e-13);
    const law = given(absorbedLaw(t, one(1), 1000));
    for (const [n, p] of Object.entries(entry.p)) {
      const single = { mantissa: law.mantissa[+n], exponent: law.exponent[+n], error: law.error[+n] } as never;
      expectScaledClose(single, p, 1e-12);
      expectScaledClose(given(absorbedProbability(t, one(1), Number(n))), p, 1e-12);
    }
    const { mean, infinite } = absorbedMoments(t, one(1));
    expectClose(given(mean), entry.mean, 1e-12);
    expect(Math.abs(infinite.value + Number(entry.finite["1"]) - 1)).toBeLessThanOrEqual(infinite.error + 2e-16);
    const tail = given(tailLaw(t, one(1), 1));
    expectClose(tail.constant, entry.tailConstant, 1e-12);
    for (const [n, ratio] of Object.entries(entry.ratio)) {
      const asymptotic = toDouble(tailProbability(tail, Number(n)).probability);
      const exact = toDouble(given(absorbedProbability(t, one(1), Number(n))));
      if (asymptotic > 1e-300) expect(exact / asymptotic / Number(ratio)).toBeCloseTo(1, 11);
    }
  });
});

test("without drift the law is explicit", () => {
  // Source: first integral of w″/2 + w² − w = 0; E[s^K; K finite] = s (1 − h²)/(1 + h √(1 − 2s/3))², h = tanh(x/√2), s0 = 3/2.
  const t = trajectoryOf(binary(0));
  for (const x of [0.1, 1, 3]) {
    const h = Math.tanh(x / Math.SQRT2);
    for (const s of [-1, -0.3, 0, 0.4, 0.99, 1, 1.2, 1.5]) {
      const w = (s * (1 - h * h)) / (1 + h * Math.sqrt(1 - (2 * s) / 3)) ** 2;
      const ours = given(profileAt(t, x, s));
      expect(Math.abs(ours.value - w)).toBeLessThanOrEqual(ours.error + 4e-15 * Math.abs(w));
    }
  }
});

const CASES: readonly [string, ProcessModel][] = [
  ["ternary", { ...binary(0.5), offspring: ternary }],
  ["ternary, drift toward", { ...binary(-1), offspring: ternary }],
  ["1, 4 or 7 children", { ...binary(0.3), offspring: finite(0, 0.1, 0, 0, 0.5, 0, 0, 0.4) }],
  ["childless deaths", { drift: 0.6, rate: 1.3, diffusion: 0.7, offspring: mixed }],
  ["childless deaths, drift toward", { drift: -0.9, rate: 1.3, diffusion: 0.7, offspring: mixed }],
  ["hardly any childless deaths", { ...binary(0.6), offspring: finite(1e-9, 0, 1 - 1e-9) }],
  ["Poisson", { ...binary(0.2), offspring: { law: "poisson", mean: 2 } }],
  ["Poisson, s0 next to 1", { ...binary(-1.2), offspring: { law: "poisson", mean: 2 } }],
  ["geometric", { ...binary(-0.7), offspring: { law: "geometric", mean: 1.5 } }],
  ["nearly critical mean", { ...binary(0.1), offspring: { law: "geometric", mean: 1.02 } }],
];
const CROWD: Start[] = [
  { position: 0.5, particles: 3 },
  { position: 2, particles: 2 },
];

describe.each(CASES)("%s", (_name, model) => {
  const t = trajectoryOf(model);

  test("the flow is a semigroup: w(x + y, s) = w(x, w(y, s))", () => {
    for (const s of [-0.9, 0, 0.3, 0.8, 1]) {
      const inner = given(profileAt(t, 0.6, s)).value;
      const whole = given(profileAt(t, 1.3, s)).value;
      expect(Math.abs(given(profileAt(t, 0.7, inner)).value - whole)).toBeLessThan(2e-14);
    }
  });

  test.each([["one", one(1)] as const, ["one, near", one(0.05)] as const, ["several", CROWD] as const])(
    "the law sums to 1 with its tail and P(K = ∞): %s",
    (_which, starts) => {
      const law = given(absorbedLaw(t, starts, 400));
      const p = law.mantissa.map((m, n) => m * 2 ** (law.exponent[n] as number));
      let below = 0;
      for (const [n, value] of p.entries()) {
        below += value;
        if (n !== 7 && n !== 8 && n !== 400) continue;
        const above = given(absorbedAbove(t, starts, n));
        expect(Math.abs(below + toDouble(above) - 1)).toBeLessThan(2e-13);
      }
      const worst = Math.max(...law.mantissa.map((m, n) => (m > 0 ? (law.error[n] as number) / m : 0)));
      // where s0 is next to 1, how w turns there is known to 12 digits only
      expect(worst).toBeLessThan(2e-11);
    },
  );

  test("mean, variance and factorial moments are those of the law", () => {
    const law = given(absorbedLaw(t, one(1), 3000));
    const p = law.mantissa.map((m, n) => m * 2 ** (law.exponent[n] as number));
    if ((p.at(-1) ?? 1) + (p.at(-2) ?? 1) > 1e-30) return;
    const total = p.reduce((a, b) => a + b, 0);
    const sum = (of: (n: number) => number) => p.reduce((a, b, n) => a + b * of(n), 0) / total;
    const moments = absorbedMoments(t, one(1));
    const mean = sum((n) => n);
    expect(given(moments.mean).value / mean).toBeCloseTo(1, 12);
    expect(given(moments.variance).value / sum((n) => (n - mean) ** 2)).toBeCloseTo(1, 11);
    expect(given(factorialMoment(t, one(1), 3)).value / sum((n) => n * (n - 1) * (n - 2))).toBeCloseTo(1, 10);
  });

  test("the asymptotic law is off by what it omits", () => {
    const tail = given(tailLaw(t, one(1), 3));
    const n = 3000 + ((tail.offset - 3000) % tail.period);
    const { probability, omitted } = tailProbability(tail, n);
    const exact = given(absorbedProbability(t, one(1), n));
    const ratio = (exact.mantissa / probability.mantissa) * 2 ** (exact.exponent - probability.exponent);
    if (omitted < 0.01) expect(Math.abs(ratio - 1)).toBeLessThan(2 * omitted + 1e-12);
    else expect(omitted).toBeGreaterThan(Math.abs(ratio - 1) / 10);
  });

  test("P(K = ∞) is what survives for ever", () => {
    const { infinite } = absorbedMoments(t, CROWD);
    const at = (x: number) => given(survivalProbability(model, x)).value;
    expect(1 - infinite.value).toBeCloseTo((1 - at(0.5)) ** 3 * (1 - at(2)) ** 2, 13);
  });
});

test("K keeps to its lattice", () => {
  const t = trajectoryOf({ ...binary(0.5), offspring: ternary });
  const law = given(absorbedLaw(t, [{ position: 1, particles: 2 }], 20));
  expect(law.mantissa.map((m) => m > 0)).toEqual(Array.from({ length: 21 }, (_, n) => n >= 2 && n % 2 === 0));
  const tail = given(tailLaw(t, [{ position: 1, particles: 2 }], 1));
  expect([tail.period, tail.offset]).toEqual([2, 2]);
  expect(toDouble(tailProbability(tail, 11).probability)).toBe(0);
  expect(toDouble(given(absorbedAbove(t, [{ position: 1, particles: 2 }], 1)))).toBe(1);
});

test("errors hold against inputs moved within their rounding", () => {
  // Computed by an independent method: the same numbers of models whose inputs are moved 2^20 times further.
  const random = new SeededRandom(20261201);
  let judged = 0;
  for (let k = 0; k < 12; k += 1) {
    const mean = 1.2 + random.next();
    const offspring: Offspring =
      k % 3 === 0 ? { law: "poisson", mean } : k % 3 === 1 ? { law: "geometric", mean } : mixed;
    const rate = 0.5 + random.next();
    const excess = k % 3 === 2 ? 1.1 : mean - 1;
    const drift = 0.8 * (2 * random.next() - 1) * Math.sqrt(2 * rate * excess);
    const model = { drift, rate, diffusion: 0.5, offspring };
    const moved = { ...model, drift: drift * (1 + 2 ** -33), rate: rate * (1 - 2 ** -33) };
    const [t, u] = [trajectoryOf(model), trajectoryOf(moved)];
    const pairs = [
      [given(profileConstants(t).s0), given(profileConstants(u).s0)],
      [given(profileAt(t, 1, 0.9)), given(profileAt(u, 1, 0.9))],
      [given(profileAt(t, 1, 1)), given(profileAt(u, 1, 1))],
      [given(absorbedMoments(t, one(1)).mean), given(absorbedMoments(u, one(1)).mean)],
      [given(tailLaw(t, one(1), 1)).constant, given(tailLaw(u, one(1), 1)).constant],
    ] as const;
    for (const [a, b] of pairs) {
      expect(Math.abs(a.value - b.value) / 2 ** 20).toBeLessThanOrEqual(a.error);
      judged += 1;
    }
    for (const n of [1, 10, 100, 1000]) {
      const a = given(absorbedProbability(t, one(1), n));
      const b = given(absorbedProbability(u, one(1), n));
      const gap = Math.abs((b.mantissa / a.mantissa) * 2 ** (b.exponent - a.exponent) - 1);
      expect(gap / 2 ** 20).toBeLessThanOrEqual(a.error / a.mantissa);
      judged += 1;
    }
  }
  expect(judged).toBe(108);
});

describe("refused, with the reason", () => {
  const t = trajectoryOf(binary(0.5));
  test.each([
    ["amplitude", profileConstants(t).amplitude],
    ["decay", profileConstants(t).decay],
    ["the limit law", absorbedLaw(t, "far", 10)],
  ] as const)("%s", (_what, answer) => {
    expect(isRefused(answer) && answer.refused).toContain("the regime is between");
  });

  test("s beyond s0, and moments beyond what one expansion gives", () => {
    const beyond = profileAt(t, 1, 10);
    expect(isRefused(beyond) && beyond.refused).toContain("diverges beyond s0");
    expect(isRefused(factorialMoment(t, one(1), 30))).toBe(true);
  });
});
