import { describe, expect, test } from "vitest";
import { traceContour } from "../../app/solvers/contour.ts";
import {
  absorbedLaw,
  describeProcess,
  type Offspring,
  type ProcessModel,
  profileAt,
  profileConstants,
} from "../../app/solvers/index.ts";
import { linearise, normalise } from "../../app/solvers/linear.ts";
import { toNumber } from "../../app/solvers/pairs.ts";
import { follow } from "../../app/solvers/path.ts";
import { readerOf } from "../../app/solvers/reader.ts";
import { nodeValues } from "../../app/solvers/sources.ts";
import { sumRange, sumsOf } from "../../app/solvers/sums.ts";
import { SeededRandom } from "../support/random.ts";
import { given, isRefused } from "./answers.ts";
import { trajectoryOf } from "./reference.ts";

/** Models of every kind, at and above the critical drift, over two orders of magnitude of rate and diffusion. */
function randomModel(random: SeededRandom): ProcessModel {
  const logarithmic = (from: number, to: number) => from * (to / from) ** random.next();
  const kind = random.next();
  let offspring: Offspring;
  if (kind < 0.25) offspring = { law: "geometric", mean: logarithmic(0.3, 6) };
  else if (kind < 0.5) offspring = { law: "poisson", mean: logarithmic(0.3, 6) };
  else {
    const weights = Array.from({ length: 3 + random.below(5) }, () => (random.next() < 0.3 ? 0 : random.next()));
    weights[weights.length - 1] = 0.05 + random.next();
    const total = weights.reduce((a, b) => a + b);
    offspring = { law: "finite", probabilities: weights.map((w) => w / total) };
  }
  const model = { drift: 0, rate: logarithmic(0.1, 10), diffusion: logarithmic(0.1, 10), offspring };
  const critical = describeProcess(model).criticalDrift;
  if (isRefused(critical)) return { ...model, drift: 2 * random.next() * Math.sqrt(model.rate * model.diffusion) };
  return { ...model, drift: critical.value * (1 + logarithmic(1e-3, 3)) };
}

/** The same with every input moved by half a unit in its last place at random. */
function jiggled(model: ProcessModel, random: SeededRandom): ProcessModel {
  const move = (x: number) => x * (1 + (random.next() - 0.5) * Number.EPSILON);
  const { offspring } = model;
  return {
    drift: move(model.drift),
    rate: move(model.rate),
    diffusion: move(model.diffusion),
    offspring: offspring.law === "finite" ? offspring : { ...offspring, mean: move(offspring.mean) },
  };
}

describe("errors hold", () => {
  test("of the constants: against a walk of higher order and smaller tolerance, inputs moved within their rounding", () => {
    // Source of the check: computed with order 48 and local error 2^−98 instead of 36 and 2^−80.
    const random = new SeededRandom(11);
    let held = 0;
    let wide = 0;
    const models = 150;
    for (let i = 0; i < models; i += 1) {
      const model = randomModel(random);
      const t = trajectoryOf(model);
      const constants = profileConstants(t);
      const other = jiggled(model, random);
      const linear = linearise(other);
      const fine = follow(normalise(other, linear), { order: 48, tolerance: 2 ** -98 });
      const pairs = [[given(constants.amplitude), toNumber(fine.amplitude)] as const];
      if (fine.turning !== null && !isRefused(constants.s0))
        pairs.push([constants.s0, toNumber(fine.turning.s0)] as const);
      for (const [estimate, value] of pairs) {
        if (Math.abs(estimate.value - value) <= estimate.error) held += 1;
        else expect.soft(`${JSON.stringify(model)}: ${estimate.value} ± ${estimate.error}`).toBe(value);
        if (estimate.error > 1000 * Number.EPSILON * estimate.value) wide += 1;
      }
    }
    expect(held).toBeGreaterThan(models);
    // a wide error is one of a nearly critical law or drift
    expect(wide).toBeLessThan(models / 4);
  });

  test("of the law: against another contour", () => {
    // Source of the check: computed on a contour of other width, tilt and nodes than the solver's two.
    const random = new SeededRandom(12);
    let wide = 0;
    let counted = 0;
    for (let i = 0; i < 40; i += 1) {
      const model = randomModel(random);
      const t = trajectoryOf(model);
      const reader = readerOf(t);
      const { turning } = reader;
      if (turning === null) continue;
      const pole = model.offspring.law === "geometric" ? 1 + 1 / model.offspring.mean : Number.POSITIVE_INFINITY;
      if (turning.s0[0] > pole * (1 - 1e-3)) continue;
      const starts = [{ position: (0.3 + 2 * random.next()) / reader.decay, particles: 1 }];
      const law = given(absorbedLaw(t, starts, 300));
      const reference = { radius: turning.s0, excess: turning.excess };
      const contour = traceContour(reader, reference, {
        width: 0.1,
        tilt: 0.4,
        panelNodes: 24,
        finest: 0.004,
        arcNodes: 520,
      });
      const values = contour && nodeValues(t, reader, contour, starts);
      if (contour === null || values === null) continue;
      const sums = sumsOf(contour, reference, values, { base: t.base, offset: 1 }, "each");
      const other = sumRange(sums, 1, 300);
      for (const n of [1, 2, 3, 5, 10, 30, 100, 300]) {
        // P(K = n) s0^n, without the spread of s0 and of the inputs, which the two contours share
        const ours = (law.mantissa[n] as number) * 2 ** ((law.exponent[n] as number) + n * Math.log2(turning.s0[0]));
        const error = (law.error[n] as number) / (law.mantissa[n] as number);
        const powerRounding = n * 4 * Number.EPSILON;
        const gap = Math.abs(ours / (other.values[n - 1] as number) - 1);
        const itsOwn = (other.rounding[n - 1] as number) / (other.values[n - 1] as number);
        expect(gap).toBeLessThanOrEqual(error + powerRounding + itsOwn);
        counted += 1;
        if (error > 1e-10) wide += 1;
      }
    }
    expect(counted).toBeGreaterThan(200);
    expect(wide).toBeLessThan(counted / 10);
  });

  test("of the law: neighbouring inputs, moved within their rounding, stay within it", () => {
    const random = new SeededRandom(13);
    let held = 0;
    let all = 0;
    for (let i = 0; i < 30; i += 1) {
      const model = randomModel(random);
      const starts = [{ position: 0.5 + random.next(), particles: 1 }];
      const [a, b] = [model, jiggled(model, random)].map((m) => given(absorbedLaw(trajectoryOf(m), starts, 400)));
      if (a === undefined || b === undefined) continue;
      for (const n of [0, 1, 4, 20, 100, 400]) {
        const scale = 2 ** ((b.exponent[n] as number) - (a.exponent[n] as number));
        const gap = Math.abs((a.mantissa[n] as number) - (b.mantissa[n] as number) * scale);
        all += 1;
        if (gap <= (a.error[n] as number) + (b.error[n] as number) * scale) held += 1;
      }
    }
    expect(held).toBe(all);
  });

  test("of the profile: composition through an intermediate barrier differs by no more than the errors say", () => {
    // Source: elementary; w(x + y, s) = w(x, w(y, s)), with s below 1 where w(x, ·) contracts.
    const random = new SeededRandom(14);
    for (let i = 0; i < 100; i += 1) {
      const t = trajectoryOf(randomModel(random));
      const decay = given(profileConstants(t).decay).value;
      const [x, y] = [random.next() / decay, random.next() / decay];
      const s = 2 * random.next() - 1;
      const inner = given(profileAt(t, y, s));
      const composed = given(profileAt(t, x, inner.value));
      const direct = given(profileAt(t, x + y, s));
      expect(Math.abs(composed.value - direct.value)).toBeLessThanOrEqual(composed.error + direct.error + inner.error);
    }
  });
});
