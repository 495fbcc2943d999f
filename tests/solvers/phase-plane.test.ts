import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Orbit, Plane, PlaneWindow } from "../../app/solvers/index.ts";
import {
  fixedPoint,
  portraitOrbits,
  processPlane,
  profileSlopeAt,
  saddleOrbits,
  traceOrbit,
  zerosOf,
} from "../../app/solvers/index.ts";
import { given } from "./answers.ts";
import { binary, trajectoryOf } from "./reference.ts";

const WINDOW: PlaneWindow = { w: [-0.3, 1.3], slope: [-1, 1] };

describe("fixed points", () => {
  test("eigenvalues solve D λ² + damping λ + f′ = 0, and say of what kind the point is", () => {
    const size = fc.double({ min: -8, max: 8, noNaN: true });
    const positive = fc.double({ min: 0.01, max: 8, noNaN: true });
    fc.assert(
      fc.property(size, positive, size, (damping, diffusion, slope) => {
        fc.pre([damping, slope].every((x) => x === 0 || Math.abs(x) > 1e-100));
        const { kind, eigenvalues, imaginary } = fixedPoint({ damping, diffusion }, 0.3, slope);
        const terms = Math.max(damping * damping, Math.abs(diffusion * slope)) / diffusion;
        for (const re of eigenvalues) {
          const real = diffusion * (re * re - imaginary * imaginary) + damping * re + slope;
          const imag = imaginary * (2 * diffusion * re + damping);
          expect(Math.abs(real)).toBeLessThanOrEqual(1e-13 * terms);
          expect(Math.abs(imag)).toBeLessThanOrEqual(1e-13 * terms);
        }
        const [a, b] = eigenvalues;
        if (imaginary > 0) expect(kind).toBe(a === 0 ? "centre" : a < 0 ? "stable focus" : "unstable focus");
        else if (a * b < 0) expect(kind).toBe("saddle");
        else if (slope !== 0) expect(kind).toBe(b < 0 ? "stable node" : "unstable node");
      }),
    );
  });

  test.each([
    // Source: J. D. Murray, Mathematical Biology I (2002), section 13.2: fronts of u_t = u_xx + u (1 − u) end in a node at
    // 0 where the speed is at least 2, else in a focus.
    [2.5, "stable node"],
    [2, "stable node"],
    [1.9, "stable focus"],
    [0, "centre"],
    [-1.9, "unstable focus"],
    [-2.5, "unstable node"],
  ])("at speed %d the front of logistic growth ends in a %s", (damping, kind) => {
    expect(fixedPoint({ damping, diffusion: 1 }, 0, 1).kind).toBe(kind);
    expect(fixedPoint({ damping, diffusion: 1 }, 1, -1).kind).toBe("saddle");
  });

  test("zeros are found by their signs, and where they are known", () => {
    const cubic = (u: number) => u * (1 - u) * (u - 0.3);
    const found = zerosOf(cubic, -0.5, 1.5, [0, 1]);
    expect(found.length).toBe(3);
    expect(found[1]).toBeCloseTo(0.3, 14);
    expect(zerosOf((u) => (u - 1) ** 2, 0, 2, [1])).toEqual([1]);
    expect(zerosOf((u) => 1 / (u - 0.501), 0, 1, [])).toEqual([]);
    expect(zerosOf((u) => u - 0.5, 0, 1, [0.5, 0.5])).toEqual([0.5]);
  });
});

/** Whether an orbit lies on slope = exact(w), within its own error and closer than so much. */
function lies(orbit: Orbit, exact: (w: number) => number, within: number): void {
  expect(orbit.length).toBeGreaterThan(20);
  for (const { w, slope, error } of orbit) {
    const off = Math.abs(slope - exact(w));
    expect(off).toBeLessThan(within);
    expect(off).toBeLessThanOrEqual(2 * error + 1e-13);
  }
}

describe("orbits", () => {
  test("of w″ + w = 0 are circles", () => {
    const plane: Plane = { diffusion: 1, damping: 0, reaction: (w) => w };
    const window: PlaneWindow = { w: [-2, 2], slope: [-2, 2] };
    for (const way of [1, -1] as const) {
      const orbit = traceOrbit(plane, [1.2, 0.5], way, window, []);
      for (const { w, slope } of orbit) expect(Math.hypot(w, slope)).toBeCloseTo(1.3, 7);
      expect(Math.sign(orbit[3]?.slope ?? 0) * ((orbit[4]?.w ?? 0) - (orbit[3]?.w ?? 0)) * way).toBeGreaterThan(0);
    }
  });

  // Source: H. P. McKean, Adv. Math. 4 (1970) 209–223, for Nagumo's equation: u′ = −u (1 − u)/√2 at the speed (1 − 2 a)/√2.
  test.each([0.1, 0.25, 0.4])("that leave the saddle 1 of Nagumo's front reach 0, a = %d", (a) => {
    const plane: Plane = {
      diffusion: 1,
      damping: (1 - 2 * a) / Math.SQRT2,
      reaction: (u) => u * (1 - u) * (u - a),
    };
    const saddle = fixedPoint(plane, 1, a - 1);
    const orbit = saddleOrbits(plane, WINDOW, saddle, [0, a, 1])[1] ?? [];
    // the saddle 0 is left again: what is off grows there
    lies(
      orbit.filter(({ w }) => w > 0.05),
      (u) => (-u * (1 - u)) / Math.SQRT2,
      1e-8,
    );
    expect(orbit.at(-1)?.w ?? 1).toBeLessThan(0.02);
  });

  // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840: u = (1 + e^{x/√6})^{−2} at the speed 5/√6.
  test("that leave the saddle 1 of the logistic front at the speed 5/√6 are the known one", () => {
    const plane: Plane = { diffusion: 1, damping: 5 / Math.sqrt(6), reaction: (u) => u * (1 - u) };
    const orbit = saddleOrbits(plane, WINDOW, fixedPoint(plane, 1, -1), [0, 1])[1] ?? [];
    lies(orbit, (u) => (-2 / Math.sqrt(6)) * u * (1 - Math.sqrt(u)), 1e-8);
  });

  // Computed by an independent method: the trajectory's Taylor steps in double-doubles.
  test("that reach the saddle q between the critical drifts are the trajectory of w(x, s)", () => {
    const offspring = { law: "finite", probabilities: [0.2, 0, 0.6, 0.2] } as const;
    const model = { drift: 0.5, rate: 1, diffusion: 0.5, offspring };
    const plane = processPlane(model);
    const t = trajectoryOf(model);
    const q = zerosOf(plane.reaction, 0, 0.9, [])[0] ?? Number.NaN;
    // G(s) = s without the factor 1 − s: s² + 4 s − 1 = 0
    expect(q).toBeCloseTo(Math.sqrt(5) - 2, 13);
    const window: PlaneWindow = { w: [-0.1, 2.2], slope: [-2, 1] };
    const reaching = saddleOrbits(plane, window, fixedPoint(plane, q, plane.slope(q)), [q, 1]).slice(2);
    for (const orbit of reaching) {
      const inside = orbit.filter(({ w, slope }) => w > 0 && w < 1.95 && (slope < -0.05 || w < 1));
      lies(inside, (w) => given(profileSlopeAt(t, 0, w)).value, 1e-7);
    }
  });

  test("without damping they keep their energy", () => {
    const plane = processPlane(binary(0));
    const energy = (w: number, slope: number) => slope ** 2 / 4 + w ** 3 / 3 - w ** 2 / 2;
    const orbit = traceOrbit(plane, [0.2, 0.1], 1, { w: [-1, 2], slope: [-2, 2] }, [0, 1]);
    for (const { w, slope } of orbit) expect(energy(w, slope)).toBeCloseTo(energy(0.2, 0.1), 8);
  });

  test("end where the reaction does", () => {
    const plane: Plane = { diffusion: 1, damping: 0, reaction: (w) => (w > 0.5 ? Number.NaN : 0) };
    const orbit = traceOrbit(plane, [0, 0.5], 1, WINDOW, []);
    expect(orbit.at(-1)?.w).toBeGreaterThan(0.4);
    expect(orbit.at(-1)?.w).toBeLessThanOrEqual(0.5);
    expect(traceOrbit(plane, [0.7, 0.5], 1, WINDOW, []).length).toBe(1);
  });
});

describe("a portrait", () => {
  test.each([2, 1, 0, -1])("fills its window with orbits that stay within it, drift %d", (drift) => {
    const plane = processPlane(binary(drift));
    const window: PlaneWindow = { w: [-0.3, 2], slope: [-1.5, 1.5] };
    const points = [0, 1].map((w) => fixedPoint(plane, w, plane.slope(w)));
    const orbits = portraitOrbits(plane, window, points, [], 9);
    expect(orbits.length).toBeGreaterThan(4);
    expect(orbits.length).toBeLessThanOrEqual(9);
    for (const { w, slope } of orbits.flat()) {
      expect(w).toBeGreaterThanOrEqual(-0.3);
      expect(w).toBeLessThanOrEqual(2);
      expect(Math.abs(slope)).toBeLessThanOrEqual(1.5);
    }
    // x increases along each: w rises where the slope is above 0
    for (const orbit of orbits) {
      const at = Math.floor(orbit.length / 2);
      const [a, b] = [orbit[at], orbit[at + 1]];
      if (a !== undefined && b !== undefined && a.slope * b.slope > 0) expect((b.w - a.w) * a.slope).toBeGreaterThan(0);
    }
  });
});
