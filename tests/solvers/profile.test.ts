import { describe, expect, test } from "vitest";
import {
  profileAt,
  profileComplementAt,
  profileConstants,
  profileSlopeAt,
  SolverError,
} from "../../app/solvers/index.ts";
import { expectClose, given, isRefused } from "./answers.ts";
import { binary, integrable, references, trajectoryOf } from "./reference.ts";

const REACHED = 2e-14;

describe("the profile w(x, s)", () => {
  test.each(references.map((r) => [r.id, r] as const))("%s at s = 0 and s = s0", (_, r) => {
    // Source of the numbers: reference.json, computed by an independent method.
    const t = trajectoryOf(r.model);
    const s0 = given(profileConstants(t).s0).value;
    for (const [x, value] of Object.entries(r.w0)) expectClose(given(profileAt(t, Number(x), 0)), value, REACHED);
    for (const [x, value] of Object.entries(r.complement0))
      expectClose(given(profileComplementAt(t, Number(x), 0)), value, REACHED);
    for (const [x, value] of Object.entries(r.wS0)) expectClose(given(profileAt(t, Number(x), s0)), value, REACHED);
    for (const [x, value] of Object.entries(r.excessS0)) {
      const complement = given(profileComplementAt(t, Number(x), s0));
      expectClose({ value: -complement.value, error: complement.error }, value, REACHED);
    }
    for (const [x, value] of Object.entries(r.slopeS0))
      expectClose(given(profileSlopeAt(t, Number(x), s0)), value, REACHED);
  });

  test("the integrable speed has a closed form", () => {
    // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840, for the integrable case; numbers in reference.json.
    const t = trajectoryOf(binary(5 / (2 * Math.sqrt(3))));
    const s0 = given(profileConstants(t).s0).value;
    for (const [x, value] of Object.entries(integrable.w0))
      expectClose(given(profileAt(t, Number(x), 0)), value, REACHED);
    for (const [x, value] of Object.entries(integrable.slopeS0))
      expectClose(given(profileSlopeAt(t, Number(x), s0)), value, REACHED);
  });

  test.each(references.map((r) => [r.id, r] as const))("%s: w(x + y, s) = w(x, w(y, s))", (_, r) => {
    // Source: elementary; the branching property of lines absorbed at one barrier behind another.
    const t = trajectoryOf(r.model);
    const s0 = given(profileConstants(t).s0).value;
    for (const s of [-1, -0.5, 0, 0.4, 0.999, 1.001, (1 + s0) / 2, s0 * (1 - 1e-9), s0])
      for (const [x, y] of [
        [0.2, 0.3],
        [0.01, 1.5],
        [2, 0.05],
      ] as const) {
        const inner = given(profileAt(t, y, s));
        const composed = given(profileComplementAt(t, x, inner.value));
        const direct = given(profileComplementAt(t, x + y, s));
        // the inner value is rounded to a double; what that does outside is the slope of w(x, ·), at most (1 − w)/(1 − s) beyond s = 1
        const inherited = (inner.error * Math.abs(composed.value)) / Math.abs(1 - inner.value);
        const allowed = composed.error + direct.error + 4 * inherited + 2e-16 * Math.abs(direct.value);
        expect(Math.abs(composed.value - direct.value)).toBeLessThanOrEqual(allowed);
      }
  });

  test("begins at s, ends at 1, and 1 is 1", () => {
    const t = trajectoryOf(binary(2));
    for (const s of [-1, -0.3, 0, 0.7, 1.2]) {
      const at = given(profileAt(t, 0, s));
      expect(Math.abs(at.value - s)).toBeLessThanOrEqual(at.error);
    }
    expect(given(profileAt(t, 3, 1)).value).toBe(1);
    expect(given(profileAt(t, 1000, 0)).value).toBe(1);
  });

  test("1 − w keeps its digits where w is 1 to all of its", () => {
    // Source: elementary; 1 − w(x, 0) = B_0 e^{−decay x}(1 + O(e^{−decay x})).
    const t = trajectoryOf(binary(2));
    const { amplitude, decay } = profileConstants(t);
    const far = given(profileComplementAt(t, 40, 0));
    expect(far.value / (given(amplitude).value * Math.exp(-40 * given(decay).value))).toBeCloseTo(1, 13);
    expect(far.error / far.value).toBeLessThan(1e-13);
  });

  test("s next to s0 is told from s0: w falls from it as a square root", () => {
    // Source: elementary; w(x, s) = w(x, s0) + w'(x, s0) √(2D(s0 − s)/f(s0)) + O(s0 − s), f(s0) = s0² − s0, D = 1/2.
    const t = trajectoryOf(binary(2));
    const s0 = given(profileConstants(t).s0).value;
    const step = 2 ** -30;
    const change = given(profileAt(t, 1, s0 - step)).value - given(profileAt(t, 1, s0)).value;
    const slope = given(profileSlopeAt(t, 1, s0)).value;
    expect(change / (slope * Math.sqrt(step / (s0 * s0 - s0)))).toBeCloseTo(1, 3);
  });

  test("slope at the barrier is the slope of the profile there", () => {
    const t = trajectoryOf(binary(2));
    const slope = given(profileSlopeAt(t, 0, 0));
    expect(slope.value).toBeCloseTo(given(profileConstants(t).slopeAtBarrier).value, 13);
  });
});

describe("what is refused", () => {
  const t = trajectoryOf(binary(2));

  test("s beyond s0, with the value of s0", () => {
    const answer = profileAt(t, 1, 6);
    expect(isRefused(answer) && answer.refused).toContain(`s0 = ${given(profileConstants(t).s0).value}`);
  });

  test("s below −1", () => {
    const answer = profileSlopeAt(t, 1, -1.5);
    expect(isRefused(answer) && answer.refused).toContain("below −1");
  });

  test("a negative start and values that are no numbers are misuse", () => {
    expect(() => profileAt(t, -1, 0)).toThrow(SolverError);
    expect(() => profileAt(t, -1, 0)).toThrow("The start is x = -1");
    expect(() => profileAt(t, Number.NaN, 0)).toThrow("The start is x = NaN");
    expect(() => profileAt(t, 1, Number.NaN)).toThrow("s is NaN");
  });
});
