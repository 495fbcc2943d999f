import { describe, expect, test } from "vitest";
import { decimal, type ExactModel } from "../../scripts/verify/exact-model.ts";
import { Fixed, toDouble } from "../../scripts/verify/fixed.ts";
import { asScaled, judge } from "../../scripts/verify/judge.ts";
import { ReferenceAnswers } from "../../scripts/verify/reference-answers.ts";
import { singularProbability } from "../../scripts/verify/singular.ts";
import { type Outcome, survey } from "../../scripts/verify/survey.ts";
import { references } from "./reference.ts";

/** Models of every kind, two or three of each: `npm run verify` asks about more. */
const MODELS = 20;
const SEED = 20_261_201;
const PATIENCE_MS = 120_000;

/** The model of a reference whose inputs are the decimals that its doubles print as. */
function exactOf(model: (typeof references)[number]["model"]): ExactModel {
  const read = (x: number) => {
    const [digits = "", power = "0"] = String(x).split("e");
    const [whole = "", fraction = ""] = digits.split(".");
    return decimal(BigInt(whole + fraction), fraction.length - Number(power));
  };
  const { offspring } = model;
  return {
    drift: read(model.drift),
    rate: read(model.rate),
    diffusion: read(model.diffusion),
    offspring:
      offspring.law === "finite"
        ? { law: "finite", probabilities: offspring.probabilities.map(read) }
        : { law: offspring.law, mean: read(offspring.mean) },
    model,
  };
}

/** A decimal of the references, exactly. */
function toReal(text: string) {
  const [digits = "", power = "0"] = text.split("e");
  const [whole = "", fraction = ""] = digits.split(".");
  const f = new Fixed(160 - Math.ceil(Number(power) * Math.log2(10)));
  const tens = Number(power) - fraction.length;
  const units = BigInt(whole + fraction);
  const value = tens >= 0 ? f.ratio(units * 10n ** BigInt(tens), 1n) : f.ratio(units, 10n ** BigInt(-tens));
  return { units: value, exponent: -f.bits };
}

/** Relative difference of two numbers in many digits. */
function apart(a: { units: bigint; exponent: number }, text: string): number {
  const b = toReal(text);
  const shift = a.exponent - b.exponent;
  const own = shift >= 0 ? a.units << BigInt(shift) : a.units >> BigInt(-shift);
  return Math.abs(toDouble({ units: own - b.units, exponent: 0 }) / toDouble({ units: b.units, exponent: 0 }));
}

describe("the reference of `npm run verify`", () => {
  const exact = references.filter(({ model }) => Number.isInteger(model.drift * 10));

  test.each(exact.map((r) => [r.id, r] as const))("%s agrees with published equations in 24 digits", (_, r) => {
    // Source of the numbers: reference.json, computed by an independent method (Cauchy integrals on a circle).
    const digits = 1e-23;
    const last = 50;
    const answers = new ReferenceAnswers(exactOf(r.model), 60 + last * Math.log2(Number(r.s0)));
    const real = (units: bigint) => answers.real(units);
    expect(apart(real(answers.s0 ?? 0n), r.s0)).toBeLessThan(digits);
    expect(apart(real(answers.slopeAtBarrier), r.slopeAtBarrier)).toBeLessThan(digits);
    expect(apart(real(answers.amplitude), r.amplitude)).toBeLessThan(digits);
    for (const law of r.laws) {
      const [whole = "", fraction = ""] = String(law.x).split(".");
      const starts = [{ position: decimal(BigInt(whole + fraction), fraction.length), particles: 1 }];
      const p = answers.law(starts, last);
      for (const [n, value] of Object.entries(law.p))
        if (Number(n) <= last) expect(apart(real(p[Number(n)] ?? 0n), value)).toBeLessThan(digits);
      const mean = answers.momentSeries(starts, 2);
      expect(apart(real(mean[1] ?? 0n), law.mean)).toBeLessThan(digits);
      const expansion = answers.singular(starts);
      if (expansion === null) throw new Error("There is a turning point.");
      expect(apart(real(answers.tailConstant(expansion)), law.tailConstant)).toBeLessThan(digits);
      const far = singularProbability(answers.f, expansion, 1000);
      if (far !== null) expect(apart(far, law.p["1000"] ?? "")).toBeLessThan(1e-22);
    }
  });

  test("between, its law is the explicit one of binary branching without drift", () => {
    // Source: first integral of w″/2 + w² − w = 0; E[s^K; K finite] = s (1 − h²)/(1 + h √(1 − 2s/3))², h = tanh(x/√2), s0 = 3/2.
    const one = decimal(1n, 0);
    const half = decimal(5n, 1);
    const zero = decimal(0n, 0);
    const answers = new ReferenceAnswers(
      {
        drift: zero,
        rate: one,
        diffusion: half,
        offspring: { law: "finite", probabilities: [zero, zero, one] },
        model: { drift: 0, rate: 1, diffusion: 0.5, offspring: { law: "finite", probabilities: [0, 0, 1] } },
      },
      100,
    );
    const { f } = answers;
    expect(f.toNumber(answers.s0 ?? 0n)).toBeCloseTo(1.5, 15);
    for (const s of [-0.75, 0.25, 1, 1.25]) {
      const h = Math.tanh(1 / Math.SQRT2);
      const w = (s * (1 - h * h)) / (1 + h * Math.sqrt(1 - (2 * s) / 3)) ** 2;
      expect(f.toNumber(answers.profile(f.one, f.double(s))?.value ?? 0n)).toBeCloseTo(w, 14);
    }
  });

  test("finds an error that is too small, and one that is not a number", () => {
    const f = new Fixed(200);
    const truth = { units: f.ratio(1n, 3n), exponent: -f.bits };
    const off = (by: number, error: number) => judge(asScaled({ value: 1 / 3 + by, error }), truth);
    expect(off(1e-10, 1e-9).holds).toBe(true);
    expect(off(1e-10, 1e-9).used).toBeCloseTo(0.1, 5);
    expect(off(1e-10, 9e-11).holds).toBe(false);
    expect(off(0, 0).holds).toBe(false);
    expect(off(0, Number.NaN).holds).toBe(false);
    expect(off(-0.1, 0.01).holds).toBe(false);
  });
});

describe("errors hold, on a sample of models of all laws and regimes", () => {
  let outcomes: Outcome[] = [];

  test(
    "every number is within its error of the reference",
    () => {
      // Computed by an independent method: recursions in s in many digits, see scripts/verify/flow.ts.
      outcomes = [...survey({ count: MODELS, seed: SEED, upTo: 40 })];
      const judged = outcomes.filter(({ verdict }) => verdict !== null);
      const broken = judged.filter(({ verdict }) => !verdict?.holds);
      for (const { subject, detail, exact, verdict } of broken)
        expect.soft(`${subject}, ${detail}, ${JSON.stringify(exact.model)}: off by ${verdict?.used} errors`).toBe("");
      expect(judged.length).toBeGreaterThan(50 * MODELS);
      expect(broken.length).toBeLessThanOrEqual(judged.length / 1000);
    },
    PATIENCE_MS,
  );

  test("and most errors are within a thousand times the true one or the double's spacing", () => {
    const widths = outcomes.flatMap(({ verdict }) => (verdict === null ? [] : [verdict.width])).sort((a, b) => a - b);
    expect(widths[Math.floor(widths.length / 2)]).toBeLessThan(100);
    expect(widths[Math.floor(0.9 * widths.length)]).toBeLessThan(1000);
  });

  test("hardly anything that has an answer is not vouched for", () => {
    const failed = outcomes.filter((o) => o.failed !== undefined && o.kind !== "toward");
    expect(failed.length).toBeLessThanOrEqual(outcomes.length / 100);
  });
});
