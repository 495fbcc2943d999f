import { describe, expect, test } from "vitest";
import type { CellResult } from "../../app/cells/index.ts";
import { viewCell } from "../../app/cells/index.ts";
import type { Value } from "../../app/formulas/index.ts";
import { log10Of, toDouble } from "../../app/formulas/index.ts";
import { cell, computed, HALF_DIE, LARVAE, plannedCell, quantityOf, reasonOf, valueIn } from "./papers.ts";

/**
 * Reference values for binary branching at rate 1, D = 1/2, drift 2.
 * Source of the equations: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017).
 * Numbers computed by an independent method: Taylor series of order 85 at 65 digits, Cauchy integral of 4096 nodes.
 */
const REFERENCE = {
  decay: 3.414213562373095,
  slope: 3.71560594573003,
  amplitude: 0.9165633924979718,
  s0: 5.436877834061205,
  w: { 0.25: 0.5949918567602501, 1: 0.9697574864439571, 4: 0.9999989258470868 },
  wAtS0: { 0.5: 2.919640129426419, 2: 1.0142141619535088 },
  slopeAtStart: -1.3616234476920688,
  mean: 0.03290227211421473,
  variance: 0.037791402158657526,
  constant: 0.1823531853797005,
  ratio: 1.0001526468958013,
  p: { 0: 0.9697574864439571, 1: 0.02786808820474097, 3: 0.0002195893912356346, 100: 5.328537271833064e-78 },
  log10p: { 1000: -740.5885949280441, 10000: -7360.234825713952 },
} as const;

const PAPER = `${LARVAE}${cell("profile w", "of: larvae", "s: [0, 1/2, 2, s0]")}${cell("counts K", "of: larvae", "start: 1", "up_to: 150")}${cell("tail T", "of: larvae", "start: 1")}`;

/** Relative agreement to 10 digits, and an error that is both kept and not a caricature. */
function agrees(value: Value | undefined, reference: number): void {
  const quantity = quantityOf(value);
  const x = toDouble(quantity);
  expect(Math.abs(x / reference - 1)).toBeLessThan(1e-10);
  expect(quantity.error * 2 ** quantity.exponent).toBeGreaterThanOrEqual(
    Math.abs(x - reference) - 1e-16 * Math.abs(reference),
  );
  expect(quantity.error).toBeLessThan(1e-9 * Math.abs(quantity.mantissa));
}

describe("values of half-line cells against the reference", () => {
  const { results, outcomes, plan } = computed(PAPER);
  const value = (id: string, name: string): Value | undefined => results.get(id)?.values[name];

  test("everything computes", () => {
    expect(plan.problems).toEqual([]);
    expect([...outcomes.values()].map(({ status }) => status)).toEqual([
      "computed",
      "computed",
      "computed",
      "computed",
      "computed",
    ]);
  });

  test("process", () => {
    agrees(value("larvae", "decay"), REFERENCE.decay);
    agrees(value("larvae", "critical_drift"), Math.SQRT2);
    expect(value("larvae", "regime")).toEqual({ type: "text", text: "away" });
    expect(toDouble(quantityOf(value("larvae", "mean_offspring")))).toBe(2);
    expect(toDouble(quantityOf(value("larvae", "limit")))).toBe(1);
    expect(toDouble(quantityOf(value("larvae", "extinction_probability")))).toBe(0);
  });

  test("profile", () => {
    agrees(value("w", "slope_at_barrier"), REFERENCE.slope);
    agrees(value("w", "amplitude"), REFERENCE.amplitude);
    agrees(value("w", "s0"), REFERENCE.s0);
    for (const [x, w] of Object.entries(REFERENCE.w)) agrees(valueIn(PAPER, `w(${x})`), w);
    for (const [x, w] of Object.entries(REFERENCE.wAtS0)) agrees(valueIn(PAPER, `w(${x}, w.s0)`), w);
  });

  test("counts", () => {
    agrees(value("K", "zero"), REFERENCE.p[0]);
    agrees(value("K", "mean"), REFERENCE.mean);
    agrees(value("K", "variance"), REFERENCE.variance);
    agrees(value("K", "s0"), REFERENCE.s0);
    expect(toDouble(quantityOf(value("K", "infinite")))).toBe(0);
    for (const [n, p] of Object.entries(REFERENCE.p)) agrees(valueIn(PAPER, `K(${n})`), p);
  });

  test("probabilities beyond up_to and beyond the double's range", () => {
    for (const [n, log10] of Object.entries(REFERENCE.log10p)) {
      expect(Math.abs(log10Of(quantityOf(valueIn(PAPER, `K(${n})`))) - log10)).toBeLessThan(2e-10);
    }
  });

  test("tail", () => {
    agrees(value("T", "s0"), REFERENCE.s0);
    agrees(value("T", "slope_at_start"), REFERENCE.slopeAtStart);
    agrees(value("T", "constant"), REFERENCE.constant);
    agrees(value("T", "ratio"), REFERENCE.ratio);
    agrees(valueIn(PAPER, "K(100)/T(100)"), 1.0015026687833735);
    const omitted = toDouble(quantityOf(value("T", "omitted")));
    // The first omitted term is what the ratio misses 1 by, to leading order.
    expect(omitted / (REFERENCE.ratio - 1)).toBeCloseTo(1, 1);
  });
});

describe("callables of counts", () => {
  // Computed by an independent method: sums of the law itself.
  test("above is what the law leaves", () => {
    const above = toDouble(quantityOf(valueIn(PAPER, "K.above(2)")));
    const sum = toDouble(quantityOf(valueIn(PAPER, "sum(K(n), n, 3, 60)")));
    expect(Math.abs(above / sum - 1)).toBeLessThan(1e-12);
    expect(toDouble(quantityOf(valueIn(PAPER, "K.above(-1)")))).toBe(1);
  });

  test("factorial moments agree with mean and variance", () => {
    agrees(valueIn(PAPER, "K.moment(1)"), REFERENCE.mean);
    agrees(valueIn(PAPER, "K.moment(2)"), REFERENCE.variance - REFERENCE.mean + REFERENCE.mean ** 2);
    expect(toDouble(quantityOf(valueIn(PAPER, "K.moment(0)")))).toBe(1);
  });

  test("quantiles step where the law says", () => {
    const crowd = LARVAE + cell("counts K", "of: larvae", "start: {0.2: 5}", "up_to: 60");
    const below = [0.01, 0.1, 0.3, 0.5, 0.9, 0.999].map((p) => {
      const n = toDouble(quantityOf(valueIn(crowd, `K.quantile(${p})`)));
      const upTo = (m: number) => (m < 0 ? 0 : toDouble(quantityOf(valueIn(crowd, `sum(K(n), n, 0, ${m})`))));
      return upTo(n) >= p && upTo(n - 1) < p;
    });
    expect(below).toEqual([true, true, true, true, true, true]);
    expect(valueIn(crowd, "K.median")).toEqual(valueIn(crowd, "K.quantile(1/2)"));
  });

  test("arguments that mean nothing are refused with the reason", () => {
    expect(reasonOf(valueIn(PAPER, "K(1/2)"))).toContain("not a whole number");
    expect(reasonOf(valueIn(PAPER, "K.quantile(1)"))).toContain("infinite");
    expect(reasonOf(valueIn(PAPER, "K.quantile(2)"))).toContain("from 0 to 1");
    expect(reasonOf(valueIn(PAPER, "K.moment(1.5)"))).toContain("whole order");
    expect(reasonOf(valueIn(PAPER, "T(0)"))).toContain("n = 1, 2, …");
    expect(reasonOf(valueIn(PAPER, "w(-1)"))).not.toBe("");
    expect(reasonOf(valueIn(PAPER, "w(1, 6)"))).toContain("5.43");
  });

  test("independent particles multiply their generating functions", () => {
    const two = LARVAE + cell("counts K", "of: larvae", "start: {1: 1, 2: 1}") + cell("profile w", "of: larvae");
    agrees(valueIn(two, "K.zero"), 0.9697574864439571 * 0.9990076731925253);
    agrees(valueIn(two, "K.zero/(w(1)*w(2))"), 1);
  });
});

test("survival of a process, also where it has no profile", () => {
  const drifting = toDouble(quantityOf(valueIn(PAPER, "larvae.survival(1)")));
  const still = toDouble(quantityOf(valueIn(PAPER, "larvae.survival(1)", { mu: "0" })));
  // Without drift: 1 − (1 − h²)/(1 + h/√3)², h = tanh(x/√2), from the equation's energy (see the solver's test).
  const h = Math.tanh(1 / Math.SQRT2);
  expect(still).toBeCloseTo(1 - (1 - h * h) / (1 + h / Math.sqrt(3)) ** 2, 14);
  expect(drifting).toBeGreaterThan(still);
  expect(reasonOf(valueIn(PAPER, "larvae.survival(0 - 1)"))).toContain("begins at 0");
});

test("errors of arguments are passed on", () => {
  const exact = quantityOf(valueIn(PAPER, "w(1)"));
  const inexact = quantityOf(valueIn(PAPER, "w(1 + K.zero - K.zero)"));
  expect(inexact.error).toBeGreaterThan(exact.error);
  expect(Math.abs(inexact.mantissa - exact.mantissa)).toBeLessThanOrEqual(inexact.error + exact.error);
});

describe("between the critical drifts", () => {
  // Source: references of the solver's test for drift 1, computed by an independent method: 65-digit Taylor series, Cauchy integral.
  const BETWEEN = {
    s0: 3.801399908701495,
    finite: 0.0735749953193315,
    mean: 1.136922117823261,
    constant: 0.30974971768862775,
  };
  const slow = computed(PAPER, { mu: "1" });
  const value = (id: string, name: string): Value | undefined => slow.results.get(id)?.values[name];
  const read = (formula: string): Value | undefined => valueIn(PAPER, formula, { mu: "1" });

  test("the process stands, with its regime; what has no meaning is refused alone", () => {
    expect(value("larvae", "regime")).toEqual({ type: "text", text: "between" });
    agrees(value("larvae", "critical_drift"), Math.SQRT2);
    for (const refused of [value("larvae", "decay"), value("w", "amplitude"), value("w", "decay")])
      expect(reasonOf(refused)).toContain("between");
  });

  test("the law is defective: mean and variance given that K is finite", () => {
    agrees(value("K", "s0"), BETWEEN.s0);
    agrees(value("K", "mean"), BETWEEN.mean);
    agrees(value("K", "infinite"), 1 - BETWEEN.finite);
    agrees(read("K(3)"), 0.001070910199632798);
    agrees(read("K.above(3)"), 1 - 0.06508567451155654 - 0.007189130311964234 - 0.001070910199632798);
    agrees(read("K.moment(2)"), toDouble(quantityOf(read("K.variance + K.mean^2 - K.mean"))));
    expect(toDouble(quantityOf(value("K", "mode")))).toBe(1);
    expect(toDouble(quantityOf(read("K.quantile(0.07)")))).toBe(2);
    expect(reasonOf(read("K.median"))).toContain("infinite with probability 0.926");
  });

  test("profile and tail", () => {
    agrees(read("w(1, 1)"), BETWEEN.finite);
    agrees(read("w(1, 1/2)"), 0.034486784547580876);
    agrees(value("w", "s0"), BETWEEN.s0);
    agrees(value("T", "constant"), BETWEEN.constant);
    agrees(value("T", "ratio"), 1.0001067705519175);
  });

  test("on a lattice the tail is 0 off it, and the ratio is taken on it", () => {
    const odd = (upTo: number) =>
      `${cell("process p", "drift: 1/2", "rate: 1", "offspring: ternary")}${cell("tail T", "of: p", "start: 1", `up_to: ${upTo}`)}`;
    expect(toDouble(quantityOf(valueIn(odd(501), "T(500)")))).toBe(0);
    expect(toDouble(quantityOf(valueIn(odd(501), "T.ratio")))).toBeCloseTo(1, 2);
    expect(reasonOf(valueIn(odd(500), "T.ratio"))).toContain("a multiple of 2 more");
  });
});

describe("a process without these answers", () => {
  const back = computed(PAPER.replace("rate: beta", HALF_DIE), { mu: "-2" });

  test("profile, counts and tail fail at their `of`, with the reason", () => {
    for (const id of ["w", "K", "T"]) {
      const outcome = back.outcomes.get(id);
      if (outcome?.status !== "failed") throw new Error(`${id}: ${outcome?.status}`);
      expect(outcome.failure.message).toContain("mean offspring 1");
      expect(outcome.failure.line).toBe((back.plan.byId.get(id)?.line ?? 0) + 1);
    }
  });
});

/** Source: reference toward/binary/mu-2, computed by an independent method (Taylor series in 65 digits, exact recursion in s). */
const TOWARD = {
  index: 5.82842712474619,
  mean: 1.796403189323234,
  p: { 1: 0.637953589009114, 10: 0.00205462155180764, 1000: 5.38532368701547e-15 },
  w: 0.380022521678408,
} as const;

describe("a drift toward the barrier", () => {
  const { results, outcomes, plan } = computed(PAPER, { mu: "-2" });
  const value = (id: string, name: string): Value | undefined => results.get(id)?.values[name];

  test("everything computes, and what has no meaning is refused alone", () => {
    for (const [id, outcome] of outcomes) expect([id, outcome.status]).toEqual([id, "computed"]);
    agrees(value("K", "mean"), TOWARD.mean);
    agrees(value("T", "exponent"), TOWARD.index);
    for (const [n, p] of Object.entries(TOWARD.p)) agrees(valueIn(PAPER, `K(${n})`, { mu: "-2" }), p);
    agrees(valueIn(PAPER, "w(1, 1/2)", { mu: "-2" }), TOWARD.w);
    for (const id of ["w", "K", "T"]) expect(toDouble(quantityOf(value(id, "s0")))).toBe(1);
    expect(toDouble(quantityOf(value("K", "infinite")))).toBe(0);
    expect(toDouble(quantityOf(value("T", "slope_at_start")))).toBe(0);
    expect(reasonOf(value("w", "amplitude"))).toContain("the regime is toward");
    expect(reasonOf(valueIn(PAPER, "K.moment(6)", { mu: "-2" }))).toContain("d = 5.82843");
    expect(reasonOf(valueIn(PAPER, "w(1, 1.5)", { mu: "-2" }))).toContain("infinite for every s above 1");
  });

  test("the tail is drawn on logarithmic axes with its power", () => {
    const view = viewCell(plannedCell(plan, "T"), results.get("T") as CellResult, plan, results);
    expect([view.figure?.x.scale, view.figure?.y.scale]).toEqual(["log", "log"]);
    expect(view.figure?.series.map(({ mark }) => mark)).toEqual(["points", "line"]);
    expect(view.figure?.alternative).toMatch(
      /approaches the power 1760000 n\^\(−1−d\), d = 5\.828\. At n = 1000 it is 0\.935302 times/,
    );
  });

  test("the curve from s0 = 1 stays at 1, and the others set the range", () => {
    const view = viewCell(plannedCell(plan, "w"), results.get("w") as CellResult, plan, results);
    const last = view.figure?.series.find(({ role }) => role === "principal");
    expect(new Set(last?.y)).toEqual(new Set([1]));
    expect(last?.x.at(-1)).toBeLessThan(40);
    expect(view.figure?.alternative).toContain("stays at 1");
    expect(view.figure?.remarks).toContain("No curve for s = 2, which is beyond s0 = 1.");
  });

  test("more terms than one are refused at their key", () => {
    const text = `${LARVAE}${cell("tail T", "of: larvae", "start: 1", "terms: 3")}`;
    const outcome = computed(text, { mu: "-2" }).outcomes.get("T");
    expect(outcome?.status === "failed" && outcome.failure.message).toContain("the leading term alone");
  });

  test("at the critical drift the tail is the logarithmic law, and the variance infinite", () => {
    const { results: critical } = computed(PAPER, { mu: "-sqrt(2)" });
    // Source: P. Maillard, Ann. Inst. H. Poincaré Probab. Stat. 49 (2013): λ x e^{λx}, λ = √2, x = 1.
    agrees(critical.get("T")?.values.constant, Math.SQRT2 * Math.exp(Math.SQRT2));
    expect(toDouble(quantityOf(critical.get("T")?.values.exponent))).toBe(1);
    expect(reasonOf(critical.get("K")?.values.variance)).toContain("infinite");
  });
});
