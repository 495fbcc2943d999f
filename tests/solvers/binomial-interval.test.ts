import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { clopperPearson, INTERVAL_ACCURACY } from "../../app/solvers/index.ts";

/** P(X = k) for X binomial (n, p), from logarithms of factorials. */
function binomial(n: number, k: number, p: number): number {
  let log = k * Math.log(p) + (n - k) * Math.log1p(-p);
  for (let i = 1; i <= k; i += 1) log += Math.log((n - k + i) / i);
  return Math.exp(log);
}

describe("intervals of Clopper and Pearson", () => {
  test.each([
    // Source: the authors' own first example gives 0.19 to 0.81 for 5 of 10 and 0.0025 to 0.445 for 1 of 10 (charts of
    // Biometrika 26 (1934)); the digits are computed by an independent method: scipy.stats.beta.ppf 1.10.
    [0, 10, 0.95, 0, 0.3084971078187608],
    [1, 10, 0.95, 0.002528578544461797, 0.445016117028195],
    [5, 10, 0.95, 0.18708602844739852, 0.8129139715526015],
    [9, 10, 0.95, 0.554983882971805, 0.9974714214555382],
    [10, 10, 0.95, 0.6915028921812392, 1],
    [39, 80, 0.95, 0.37405748144443957, 0.6018953312968142],
  ])("%i of %i at %f", (hits, trials, confidence, low, high) => {
    const interval = clopperPearson(hits, trials, confidence);
    expect(Math.abs(interval.low - low)).toBeLessThanOrEqual(1e-14);
    expect(Math.abs(interval.high - high)).toBeLessThanOrEqual(1e-14);
  });

  test("at each end the tail is what the confidence leaves outside", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 400 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.constantFrom(0.5, 0.9, 0.95, 0.999, 1 - 1e-6),
        (trials, share, confidence) => {
          const hits = Math.floor(share * trials);
          const { low, high } = clopperPearson(hits, trials, confidence);
          const outside = (1 - confidence) / 2;
          let above = 0;
          let below = 0;
          for (let k = 0; k <= trials; k += 1) {
            if (k >= hits && low > 0) above += binomial(trials, k, low);
            if (k <= hits && high < 1) below += binomial(trials, k, high);
          }
          // What the tails change when the ends change by their error, with d/dp P(X ≥ k) = k P(X = k)/p and
          // d/dp P(X ≤ k) = −(n − k) P(X = k)/(1 − p), and what this test's own sums lose.
          const moved = (slope: number, end: number) => (slope * end * INTERVAL_ACCURACY) / outside + 1e-11;
          if (hits > 0) {
            const slope = (hits * binomial(trials, hits, low)) / low;
            expect(Math.abs(above / outside - 1)).toBeLessThan(moved(slope, low));
          }
          if (hits < trials) {
            const slope = ((trials - hits) * binomial(trials, hits, high)) / (1 - high);
            expect(Math.abs(below / outside - 1)).toBeLessThan(moved(slope, high));
          }
        },
      ),
    );
  });

  test("the probability is covered with the confidence, whatever it is: all samples of 60, exactly", () => {
    const trials = 60;
    const intervals = Array.from({ length: trials + 1 }, (_, hits) => clopperPearson(hits, trials, 0.95));
    let least = 1;
    for (let p = 0.001; p < 1; p += 0.001) {
      let covered = 0;
      for (const [hits, { low, high }] of intervals.entries())
        if (low <= p && p <= high) covered += binomial(trials, hits, p);
      least = Math.min(least, covered);
      expect(covered).toBeGreaterThanOrEqual(0.95 - 1e-12);
    }
    expect(least, "and not needlessly wide").toBeLessThan(0.955);
  });

  test("large counts keep their digits", () => {
    // Computed by an independent method: mpmath 1.3 to 30 digits, regularised incomplete beta functions at these ends.
    const few = clopperPearson(7, 1e9, 0.99);
    expect(few.low / 2.0373374827363117e-9 - 1).toBeLessThan(1e-13);
    expect(few.high / 1.7133593182100912e-8 - 1).toBeLessThan(1e-13);
    // Half of many: the normal law's 1.959964 standard errors, from tables.
    const half = clopperPearson(5e8, 1e9, 0.95);
    expect((0.5 - half.low) * 2 * Math.sqrt(1e9)).toBeCloseTo(1.95996, 3);
    expect(half.high + half.low).toBeCloseTo(1, 12);
  });

  test.each([
    [3, 2, 0.95],
    [-1, 2, 0.95],
    [1.5, 2, 0.95],
    [0, 0, 0.95],
    [1, 2, 1],
    [1, 2, 0],
  ])("%d hits of %d at %d are refused", (hits, trials, confidence) => {
    expect(() => clopperPearson(hits, trials, confidence)).toThrow(/counts|confidence/);
  });
});
