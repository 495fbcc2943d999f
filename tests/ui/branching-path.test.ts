import { expect, test } from "vitest";
import { ancestryOfAbsorbed, type BranchingModel, simulateBranching } from "../../app/ui/branching-path.ts";

const MODEL: BranchingModel = { start: 0.4, drift: 2, rate: 1, diffusion: 0.5, until: 3, step: 0.05 };

test("the same number gives the same picture, another another", () => {
  expect(simulateBranching(MODEL, 7)).toEqual(simulateBranching(MODEL, 7));
  expect(simulateBranching(MODEL, 7)).not.toEqual(simulateBranching(MODEL, 8));
});

test("as many are absorbed on average as the theory says", () => {
  // Source: the many-to-one formula and the law of the hitting time of Brownian motion with drift,
  // E[number absorbed] = E[e^(beta tau)] = exp(-(mu + sqrt(mu² - 2 beta)) x) for mu >= sqrt(2 beta);
  // Borodin & Salminen, Handbook of Brownian Motion, 2nd ed., 2002, II.2.0.1.
  const { drift, rate, start } = MODEL;
  const expected = Math.exp(-(drift + Math.sqrt(drift * drift - 2 * rate)) * start);
  const counts = Array.from(
    { length: 4000 },
    (_, tree) => simulateBranching(MODEL, tree + 1).filter(({ absorbed }) => absorbed).length,
  );
  const mean = counts.reduce((sum, count) => sum + count, 0) / counts.length;
  const variance = counts.reduce((sum, count) => sum + (count - mean) ** 2, 0) / (counts.length - 1);
  const late = lateArrivals(MODEL);
  expect(Math.abs(mean + late - expected)).toBeLessThan(4 * Math.sqrt(variance / counts.length));
});

/** Expected arrivals after `until`: the integral of e^(beta t) times the hitting density, by the trapezoidal rule. */
function lateArrivals({ start, drift, rate, until }: BranchingModel): number {
  const density = (t: number) =>
    (start / Math.sqrt(2 * Math.PI * t ** 3)) * Math.exp(rate * t - (start + drift * t) ** 2 / (2 * t));
  const step = 0.001;
  let sum = 0;
  for (let t = until; t < until + 60; t += step) sum += ((density(t) + density(t + step)) / 2) * step;
  return sum;
}

test("lineages hang together: each begins where and when its parent ended, and ends at the shore, in two, or at the end", () => {
  const lineages = simulateBranching(MODEL, 11);
  const children = new Map<number, number>();
  lineages.forEach((lineage, index) => {
    expect(lineage.times.length).toBe(lineage.positions.length);
    expect(lineage.times.every((time, at) => at === 0 || time >= (lineage.times[at - 1] ?? 0))).toBe(true);
    expect(lineage.positions.slice(0, -1).every((position) => position > 0)).toBe(true);
    expect(lineage.positions.at(-1) === 0).toBe(lineage.absorbed);
    if (lineage.parent === null) return;
    const parent = lineages[lineage.parent];
    expect(lineage.parent).toBeLessThan(index);
    expect(parent?.times.at(-1)).toBe(lineage.times[0]);
    expect(parent?.positions.at(-1)).toBe(lineage.positions[0]);
    children.set(lineage.parent, (children.get(lineage.parent) ?? 0) + 1);
  });
  lineages.forEach((lineage, index) => {
    const ends = lineage.absorbed || lineage.times.at(-1) === 3;
    expect(children.get(index) ?? 0).toBe(ends ? 0 : 2);
  });
});

test("the ancestry of the absorbed is closed under parents and nothing more", () => {
  const lineages = simulateBranching({ ...MODEL, start: 0.2, until: 2 }, 3);
  const inked = ancestryOfAbsorbed(lineages);
  lineages.forEach((lineage, index) => {
    const ownChild = lineages.some((child, at) => child.parent === index && inked.has(at));
    expect(inked.has(index)).toBe(lineage.absorbed || ownChild);
  });
});
