import { describe, expect, test } from "vitest";
import { profileConstants, SolverError, solveTrajectory } from "../../app/solvers/index.ts";
import { expectClose, given, isRefused, relativeGap, scaled } from "./answers.ts";
import { binary, integrable, references, trajectoryOf } from "./reference.ts";

/** What the issue asks for is 1e-10; this is what is reached. */
const REACHED = 1e-14;

describe("constants of the trajectory", () => {
  test.each(references.map((r) => [r.id, r] as const))("%s: s0, slope at the barrier, amplitude, decay", (_, r) => {
    // Source of the numbers: reference.json, computed by an independent method.
    const constants = profileConstants(trajectoryOf(r.model));
    expectClose(given(constants.s0), r.s0, REACHED);
    expectClose(given(constants.slopeAtBarrier), r.slopeAtBarrier, REACHED);
    expectClose(given(constants.amplitude), r.amplitude, REACHED);
    expectClose(given(constants.decay), r.decay, REACHED);
    const turning = given(trajectoryOf(r.model).turning);
    expect(Math.abs(relativeGap(scaled(-turning.amplitude[0]), r.amplitudeAtS0))).toBeLessThan(REACHED);
  });

  test("the integrable speed has a closed form", () => {
    // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840, for the integrable case; numbers in reference.json.
    const constants = profileConstants(trajectoryOf(binary(5 / (2 * Math.sqrt(3)))));
    expectClose(given(constants.s0), integrable.s0, REACHED);
    expectClose(given(constants.slopeAtBarrier), integrable.slopeAtBarrier, REACHED);
    expectClose(given(constants.amplitude), integrable.amplitude, REACHED);
    // Source: elementary, from the same closed form: w'(0) = (2 + √(4 + B_0²))/√3.
    const amplitude = given(constants.amplitude).value;
    expect(given(constants.slopeAtBarrier).value).toBeCloseTo((2 + Math.sqrt(4 + amplitude ** 2)) / Math.sqrt(3), 14);
  });

  test("errors stay near the last digit where the inputs are exact, and grow with the closeness to the critical drift", () => {
    const exact = given(profileConstants(trajectoryOf(binary(2))).s0);
    expect(exact.error).toBeLessThan(2 * Number.EPSILON * exact.value);
    const near = given(profileConstants(trajectoryOf(binary(Math.SQRT2 * (1 + 1e-9)))).s0);
    expect(near.error).toBeGreaterThan(1e-13);
    expect(near.error).toBeLessThan(1e-10);
  });

  test("depends on length and time units as it must", () => {
    // Source: elementary; x → 3x and t → 7t leave w unchanged.
    const t = trajectoryOf(binary(2));
    const scaledUp = trajectoryOf({
      drift: (2 * 3) / 7,
      rate: 1 / 7,
      diffusion: (0.5 * 9) / 7,
      offspring: t.model.offspring,
    });
    const [a, b] = [profileConstants(t), profileConstants(scaledUp)];
    expect(given(b.s0).value).toBeCloseTo(given(a.s0).value, 13);
    expect(given(b.amplitude).value).toBeCloseTo(given(a.amplitude).value, 14);
    expect(given(b.slopeAtBarrier).value * 3).toBeCloseTo(given(a.slopeAtBarrier).value, 13);
  });

  test("is plain JSON, and small", () => {
    const t = trajectoryOf(binary(2));
    const text = JSON.stringify(t);
    expect(JSON.parse(text)).toEqual(t);
    expect(text.length).toBeLessThan(6000);
  });

  test("a large drift: s0 grows as its square", () => {
    // Source: scaling of the equation at large drift; s0/drift² → constant, seen to tend to 1.7 in the references at 3 and 5.
    const at = (drift: number) => given(profileConstants(trajectoryOf(binary(drift))).s0).value / drift ** 2;
    expect(at(200) / at(100)).toBeCloseTo(1, 2);
    expect(given(profileConstants(trajectoryOf(binary(200))).amplitude).value).toBeCloseTo(1, 4);
  });
});

describe("where there is no trajectory", () => {
  test("mean offspring 1 with drift not above 0", () => {
    const answer = solveTrajectory({ ...binary(0), offspring: { law: "poisson", mean: 1 } });
    expect(isRefused(answer) && answer.refused).toContain("mean offspring 1");
  });

  test("mean offspring 1 with drift above 0 is solved, as is mean below 1 with any drift", () => {
    for (const [mean, drift] of [
      [1, 0.5],
      [0.5, 2],
      [0.5, 0],
      [0.5, -0.5],
    ] as const)
      expect(isRefused(solveTrajectory({ ...binary(drift), offspring: { law: "poisson", mean } }))).toBe(false);
  });

  test("without branching s0 is infinite, and the rest stands", () => {
    const t = trajectoryOf({ ...binary(1), offspring: { law: "finite", probabilities: [0.4, 0.6] } });
    const constants = profileConstants(t);
    expect(isRefused(constants.s0) && constants.s0.refused).toContain("s0 is infinite");
    // Source: elementary; E[s^K] = 1 − (1 − s) e^{−decay x}, decay = 1 + √(1 + 2·0.4).
    expect(given(constants.amplitude).value).toBeCloseTo(1, 15);
    expect(given(constants.slopeAtBarrier).value).toBeCloseTo(1 + Math.sqrt(1.8), 14);
  });

  test("a trajectory that ends at the second fixed point, or at a geometric law's pole, says so", () => {
    const fixed = trajectoryOf({ ...binary(-5), offspring: { law: "poisson", mean: 0.8 } });
    expect(isRefused(fixed.turning) && fixed.turning.refused).toContain("the second root of G(s) = s");
    const pole = trajectoryOf({ ...binary(20), offspring: { law: "geometric", mean: 2 } });
    expect(isRefused(pole.turning) && pole.turning.refused).toContain("the pole of the geometric law");
  });
});

describe("misuse", () => {
  const misused = (change: object) => () => solveTrajectory({ ...binary(2), ...change });
  test.each([
    ["a drift that is not finite", { drift: Number.NaN }, "The drift is NaN"],
    ["a rate of 0", { rate: 0 }, "The rate is 0"],
    ["a negative diffusion", { diffusion: -1 }, "The diffusion is -1"],
    [
      "probabilities that do not sum to 1",
      { offspring: { law: "finite", probabilities: [0.1, 0, 0.8] } },
      "sum to 0.9",
    ],
    ["a negative probability", { offspring: { law: "finite", probabilities: [-0.1, 0, 1.1] } }, "0 children is -0.1"],
    ["no children at all", { offspring: { law: "finite", probabilities: [1] } }, "no children at all"],
    ["a mean of 0", { offspring: { law: "geometric", mean: 0 } }, "The mean of the geometric offspring law is 0"],
    [
      "too many children",
      { offspring: { law: "finite", probabilities: [...new Array<number>(300).fill(0), 1] } },
      "at most 200",
    ],
  ])("%s", (_, change, words) => {
    expect(misused(change)).toThrow(SolverError);
    expect(misused(change)).toThrow(words);
  });
});
