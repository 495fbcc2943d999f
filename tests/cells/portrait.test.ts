import { describe, expect, test } from "vitest";
import { viewCell } from "../../app/cells/index.ts";
import type { Figure } from "../../app/figures/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { references } from "../solvers/reference.ts";
import { cell, computed, LARVAE, plannedCell, planOf, quantityOf, reasonOf } from "./papers.ts";
import { referenceProcess } from "./reference-process.ts";

function drawn(text: string, overrides: Record<string, string> = {}): Figure {
  const { plan, results, outcomes } = computed(text, overrides);
  const result = results.get("P");
  if (result === undefined) throw new Error(JSON.stringify(outcomes.get("P")));
  const { figure, points } = viewCell(plannedCell(plan, "P"), result, plan, results);
  if (figure === null || points === null) throw new Error("There is no figure.");
  expect(points.rows.length).toBeGreaterThan(100);
  return figure;
}

const dotsOf = (figure: Figure) => figure.series.flatMap(({ dots }) => (dots ?? []).map(({ label }) => label));

// Source of the equations: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143.
// Numbers computed by an independent method: Taylor series of order 85 at 65 digits.
test.each(references.map((entry) => [entry.id, entry] as const))("values of the portrait of %s", (_, entry) => {
  const values = computed(`${referenceProcess(entry)}${cell("portrait P", "of: larvae")}`).results.get("P")?.values;
  for (const [name, wanted] of [
    ["slope_at_barrier", entry.slopeAtBarrier],
    ["s0", entry.s0],
  ] as const) {
    const quantity = quantityOf(values?.[name]);
    expect(Math.abs(toDouble(quantity) / Number(wanted) - 1)).toBeLessThan(1e-13);
  }
});

describe("the portrait of a process", () => {
  const text = `${LARVAE}${cell("portrait P", "of: larvae")}`;

  test("away: the trajectory goes from the barrier and from s0 to the node 1, past no other orbit", () => {
    const figure = drawn(text);
    expect(dotsOf(figure)).toEqual(["w'(0)=3.716", "s_0=5.437", "saddle", "stable node"]);
    const [rising, falling] = figure.series.filter(({ role, mark }) => role === "principal" && mark === "line");
    expect([rising?.x[0], rising?.x.at(-1), rising?.y.at(-1)]).toEqual([0, 1, 0]);
    expect([falling?.x[0], falling?.x.at(-1)]).toEqual([5.436877834061205, 1]);
    expect(figure.remarks).toContain(
      "w = 0 is a saddle, eigenvalues −4.449 and 0.4495; w = 1 is a stable node, eigenvalues −3.414 and −0.5858.",
    );
    expect(figure.alternative).toContain("from (0, 3.716) to (1, 0)");
    expect(figure.series.filter(({ role }) => role === "thin").length).toBeGreaterThan(6);
    // Every drawn point of the trajectory solves D p dp/dw + drift p + f(w) = 0 with D = 1/2, f = w² − w, by differences.
    const [x, y] = [falling?.x ?? [], falling?.y.map((value) => value ?? Number.NaN) ?? []];
    for (let i = 30; i < 110; i += 1) {
      const [a, b, p] = [i - 1, i + 1, y[i] ?? 0];
      const slope = ((y[b] ?? 0) - (y[a] ?? 0)) / ((x[b] ?? 0) - (x[a] ?? 0));
      const w = x[i] ?? 0;
      expect(Math.abs((p * slope) / 2 + 2 * p + w * w - w)).toBeLessThan(0.02);
    }
  });

  test.each([
    ["1", ["s_0=3.801", "saddle", "stable focus"]],
    ["0", ["s_0=1.5", "saddle", "centre"]],
    ["-1", ["s_0=1.01", "saddle", "unstable focus"]],
    ["-2", ["saddle", "unstable node"]],
    ["sqrt(2)", ["w'(0)=2.252", "s_0=1.349", "saddle", "stable node"]],
  ])("with drift %s its points are %j", (mu, dots) => {
    // slope at the critical drift: tests/solvers/reference.json; s0 = 3/2 without drift: energy of w″/2 + w² − w
    expect(dotsOf(drawn(text, { mu }))).toEqual(dots);
  });

  test("below mean 1 the second root of G(s) = s is there too, and 1 is a saddle", () => {
    // G(s) = 0.6 + 0.4 s²: roots 1 and 3/2
    const figure = drawn(
      `${cell("process sub", "drift: 0.3", "rate: 1", "offspring: {0: 0.6, 2: 0.4}")}${cell("portrait P", "of: sub")}`,
    );
    const points = figure.series.find(({ name }) => name === "fixed points");
    expect(points?.x.length).toBe(2);
    expect(points?.x[1]).toBeCloseTo(1.5, 12);
    expect(dotsOf(figure)).toContain("saddle");
  });

  test("nothing is drawn beyond the pole of a geometric law", () => {
    const figure = drawn(
      `${cell("process geo", "drift: 2", "rate: 1", "offspring: {law: geometric, mean: 2}")}${cell("portrait P", "of: geo")}`,
    );
    for (const { x } of figure.series) expect(Math.max(...x)).toBeLessThan(1.5);
  });
});

describe("the portrait of a front", () => {
  test("has the orbit that leaves 1, and refuses what belongs to a barrier", () => {
    const text = cell("portrait P", "reaction: u*(1 - u)", "speed: 5/sqrt(6)");
    const figure = drawn(text);
    expect(dotsOf(figure)).toEqual(["stable node", "saddle"]);
    const front = figure.series.find(({ name }) => name === "trajectory");
    // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840.
    front?.x.forEach((u, i) => {
      expect(front.y[i] ?? 1).toBeCloseTo((-2 / Math.sqrt(6)) * u * (1 - Math.sqrt(u)), 7);
    });
    expect(reasonOf(computed(text).results.get("P")?.values.s0)).toContain("A front has no barrier");
  });

  test("takes D and parameters, and scales as it must", () => {
    // With D = 4 and twice the speed the front is the same over half the slope.
    const around = cell("parameters", "c: 2.5");
    const once = drawn(`${around}${cell("portrait P", "reaction: u*(1 - u)", "speed: c")}`);
    const wide = drawn(`${around}${cell("portrait P", "reaction: u*(1 - u)", "speed: 2*c", "diffusion: 4")}`);
    const lowest = (figure: Figure) =>
      Math.min(...(figure.series.find(({ name }) => name === "trajectory")?.y.map((y) => y ?? 0) ?? [0]));
    expect(lowest(wide)).toBeCloseTo(lowest(once) / 2, 4);
  });

  test("below the least speed the front's orbit winds about 0", () => {
    const figure = drawn(cell("portrait P", "reaction: u*(1 - u)", "speed: 0.6"));
    const front = figure.series.find(({ name }) => name === "trajectory");
    expect(Math.min(...(front?.x ?? [0]))).toBeLessThan(-0.05);
    expect(dotsOf(figure)).toContain("stable focus");
  });

  test("where 1 is no saddle none is set apart, and it says so", () => {
    const figure = drawn(cell("portrait P", "reaction: -u*(1 - u)", "speed: 3"));
    expect(figure.remarks[0]).toBe(
      "No orbit is set apart: u = 1 is a stable node, not a saddle that one orbit leaves towards 0.",
    );
  });
});

test.each([
  ["", "needs `of`, a process, or `reaction` and `speed`"],
  ["of: larvae\nreaction: u*(1-u)\nspeed: 2", "do not stand together"],
  ["reaction: u*(1-u)", "`speed` is missing"],
  ["of: larvae\nspeed: 2", "`speed` belongs to a `reaction`"],
  ["of: larvae\ndiffusion: 2", "`diffusion` belongs to a `reaction`"],
  ["reaction: u*(1-u)\nspeed: 2\ndiffusion: 0", "it must be a number above 0"],
  ["reaction: u\nspeed: 2", "`reaction` is 1 at u = 1; a front from 1 to 0 needs it to be 0 at both"],
  ["reaction: u*(1-u)*log(u - 1/2)\nspeed: 2", "`reaction` has no value at u = 0: "],
  ["reaction: 0*u\nspeed: 2", "`reaction` is 0 from u = 0 to 1"],
  ["reaction: u*(1-v)\nspeed: 2", "`v` is not a parameter of this paper"],
  ["reaction: u*(1-u)\nspeed: u", "`u` is not a parameter of this paper"],
])("%j is refused", (lines, message) => {
  const text = `${LARVAE}${cell("portrait P", ...lines.split("\n"))}`;
  const outcome = computed(text).outcomes.get("P");
  const told = planOf(text).problems.map((problem) => problem.message);
  if (outcome?.status === "failed") told.push(outcome.failure.message);
  expect(told.join("\n")).toContain(message);
});
