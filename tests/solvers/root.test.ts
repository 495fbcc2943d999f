import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { NoRoot, Probe, Root } from "../../app/solvers/index.ts";
import { findRoot, SolverError } from "../../app/solvers/index.ts";

/** A function with an error of so much, relative to its size and absolutely. */
function known(f: (x: number) => number, relative = 0, absolute = 0): Probe {
  return (x) => ({ mantissa: f(x), exponent: 0, error: Math.abs(f(x)) * relative + absolute });
}

function rootOf(found: Root | NoRoot): Root {
  if ("why" in found) throw new Error(JSON.stringify(found));
  return found;
}

function encloses({ root }: Root, wanted: number): void {
  expect(Math.abs(root.value - wanted)).toBeLessThanOrEqual(root.error + Number.EPSILON * Math.abs(wanted));
}

const EXACTLY = 2 ** -52;

describe("roots of functions known to rounding", () => {
  test.each([
    ["x² − 2", (x: number) => x * x - 2, 0, 2, Math.SQRT2],
    // Source: OEIS A003957.
    ["cos x − x", (x: number) => Math.cos(x) - x, 0, 1, 0.7390851332151607],
    // Source: OEIS A030178.
    ["x e^x − 1", (x: number) => x * Math.exp(x) - 1, 0, 3, 0.5671432904097838],
    ["x³, triple", (x: number) => (x - 1) ** 3, -2, 3.1, 1],
    ["cube root", (x: number) => Math.cbrt(x - 1.3), 0, 7, 1.3],
    ["a steep step", (x: number) => Math.tanh((x - 0.7) * 1e9), 0, 1, 0.7],
    ["x near 0", (x: number) => x + x ** 3, -3, 5, 0],
    ["decreasing", (x: number) => 1 / x - 4, 0.01, 9, 0.25],
  ])("%s", (_, f, from, to, wanted) => {
    const found = rootOf(findRoot(known(f, EXACTLY, 1e-16), from, to));
    encloses(found, wanted);
    expect(found.unanswered).toBeNull();
    expect(found.evaluations).toBeLessThan(140);
  });

  test("a smooth one takes few steps, and its error is a few units in the last place", () => {
    const found = rootOf(
      findRoot(
        known((x) => Math.exp(x) - 3, EXACTLY, 1e-16),
        0,
        4,
      ),
    );
    expect(found.evaluations).toBeLessThan(18);
    expect(found.root.error).toBeLessThan(1e-15);
  });

  test("values far below the range of doubles", () => {
    // 2^−3000 (x − 1/3)
    const probe: Probe = (x) => ({ mantissa: x - 1 / 3, exponent: -3000, error: 1e-17 });
    encloses(rootOf(findRoot(probe, 0, 1)), 1 / 3);
  });

  test("an exact 0 at an end is the root", () => {
    const found = rootOf(
      findRoot(
        known((x) => x - 2),
        2,
        5,
      ),
    );
    expect(found.root).toEqual({ value: 2, error: 0 });
  });
});

describe("errors of the function's values", () => {
  // Exact by construction: the values are those of slope·(x − root), moved within their error.
  test("the root of what the values stand for lies within the error, which is not much more than theirs over the slope", () => {
    const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(between(-5, 5), between(-6, 6), between(-12, -1), between(1, 50), (root, power, size, bend) => {
        const slope = 10 ** power;
        const error = slope * 10 ** size;
        const probe: Probe = (x) => {
          const noise = Math.sin(x * 1e7) * 0.99;
          const rise = slope * Math.sinh((x - root) / bend) * bend;
          return { mantissa: rise + noise * error, exponent: 0, error: error + 1e-14 * Math.abs(rise) };
        };
        const found = findRoot(probe, -9.5, 10.25);
        encloses(rootOf(found), root);
        expect(rootOf(found).root.error).toBeLessThan(12 * 10 ** size + 1e-13);
      }),
    );
  });

  test("at an end that is 0 within its error nothing is enclosed", () => {
    const found = findRoot(
      known((x) => x - 2, 0, 1e-6),
      2,
      5,
    );
    expect(found).toMatchObject({ why: "undecided end", end: { x: 2 } });
  });
});

describe("where there is no root to give", () => {
  test("the same sign at both ends", () => {
    const found = findRoot(
      known((x) => x * x + 1),
      -1,
      2,
    );
    expect(found).toMatchObject({ why: "same sign", low: { x: -1, height: 2 }, high: { x: 2, height: 5 } });
  });

  test.each([
    ["a jump", (x: number) => (x < 0.3 ? -1 : 2) + x],
    ["a jump on a slope", (x: number) => 5 * x + (x < 0.3 ? -4 : 0)],
    ["a pole", (x: number) => 1 / (x * x - 0.09000000000000001)],
  ])("%s is no root", (_, f) => {
    const found = findRoot(known(f, EXACTLY), 0, 1);
    expect("why" in found && found.why).toBe("jump");
    if ("why" in found && found.why === "jump") expect(found.low.x).toBeCloseTo(0.3, 12);
  });

  test("where it is infinite it has no value", () => {
    expect(
      findRoot(
        known((x) => 1 / (x - 0.5)),
        0,
        1,
      ),
    ).toMatchObject({ why: "gap", reason: "Its value is infinite." });
  });

  test("misuse", () => {
    expect(() =>
      findRoot(
        known((x) => x),
        1,
        1,
      ),
    ).toThrow(SolverError);
    expect(() =>
      findRoot(
        known((x) => x),
        0,
        Number.POSITIVE_INFINITY,
      ),
    ).toThrow("from 0 to Infinity");
  });
});

describe("functions without a value somewhere", () => {
  const partly =
    (has: (x: number) => boolean, f: (x: number) => number): Probe =>
    (x) =>
      has(x) ? { mantissa: f(x), exponent: 0, error: 0 } : { refused: "none here" };

  test("the search keeps to where it has values, up to their very edge", () => {
    // a root 1e−9 from the edge
    const found = rootOf(
      findRoot(
        partly(
          (x) => x >= 2,
          (x) => x - 2 - 1e-9,
        ),
        0,
        5,
      ),
    );
    encloses(found, 2 + 1e-9);
    expect(found.unanswered).toBe("none here");
    expect(found.answered[0]).toBeGreaterThanOrEqual(2);
  });

  test("neither end has one", () => {
    encloses(
      rootOf(
        findRoot(
          partly(
            (x) => x > 2 && x < 4,
            (x) => x * x - 11,
          ),
          0,
          9,
        ),
      ),
      Math.sqrt(11),
    );
  });

  test("no point tried has one", () => {
    expect(findRoot(() => ({ refused: "never" }), 0, 1)).toEqual({ why: "no values", reason: "never" });
  });

  test("none between the signs", () => {
    const found = findRoot(
      partly(
        (x) => Math.abs(x - 1) > 0.25,
        (x) => x - 1,
      ),
      0,
      3,
    );
    expect(found).toMatchObject({ why: "gap", reason: "none here" });
  });
});
