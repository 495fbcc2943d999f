import { Solver } from "odex";
import type { Estimate, ProcessModel } from "../../app/solvers/index.ts";

/** The profile equation integrated by an extrapolation method that shares nothing with the solver: no series of high order, no
 *  scaling, no double-doubles. Source of the method: E. Hairer, S. P. Nørsett, G. Wanner, Solving Ordinary Differential
 *  Equations I (1993), section II.9 (Gragg–Bulirsch–Stoer). */

/** G(s) and its second derivative at 1, and 1 − s − … kept in terms of u = 1 − w. */
export interface Reaction {
  /** f(1 − u) = rate (G(1 − u) − (1 − u)) */
  readonly ofComplement: (u: number) => number;
  readonly secondMoment: number;
  readonly excess: number;
}

export function reactionOf(model: ProcessModel): Reaction {
  const { rate, offspring } = model;
  if (offspring.law === "geometric") {
    const m = offspring.mean;
    return {
      ofComplement: (u) => rate * (1 / (1 + m * u) - 1 + u),
      secondMoment: 2 * m * m,
      excess: m - 1,
    };
  }
  if (offspring.law === "poisson") {
    const m = offspring.mean;
    return { ofComplement: (u) => rate * (Math.expm1(-m * u) + u), secondMoment: m * m, excess: m - 1 };
  }
  const p = offspring.probabilities;
  return {
    // near u = 0 without cancellation; beyond u = 1, where there is no logarithm, by powers
    ofComplement: (u) =>
      rate * p.reduce((sum, q, k) => sum + q * ((u < 0.5 ? Math.expm1(k * Math.log1p(-u)) : (1 - u) ** k - 1) + u), 0),
    secondMoment: p.reduce((sum, q, k) => sum + q * k * (k - 1), 0),
    excess: p.reduce((sum, q, k) => sum + q * (k - 1), 0),
  };
}

const TOLERANCE = 1e-13;
/** z at the start: u = z + c z² is exact to z³ there. */
const START = 1e-5;
const BISECTIONS = 60;

/** Amplitude and slope where w = 0 (sign 1), or amplitude and s0 where w' = 0 (sign −1), by backward integration from far away. */
export function eventOf(model: ProcessModel, sign: 1 | -1): { amplitude: number; value: number } {
  const { drift, diffusion, rate } = model;
  const { ofComplement, secondMoment, excess } = reactionOf(model);
  const growth = rate * excess;
  const decay = (drift + Math.sqrt(Math.max(0, drift * drift - 4 * diffusion * growth))) / (2 * diffusion);
  const curvature = (rate * secondMoment) / 2 / (4 * diffusion * decay ** 2 - 2 * drift * decay + growth);
  const z = sign * START;
  const u0 = z + curvature * z * z;
  const slope0 = -decay * (z + 2 * curvature * z * z);
  const solver = new Solver(2);
  solver.absoluteTolerance = TOLERANCE * START;
  solver.relativeTolerance = TOLERANCE;
  solver.denseOutput = true;
  const right = (_: number, y: number[]) => {
    const [u = 0, v = 0] = y;
    return [v, (ofComplement(u) - drift * v) / diffusion];
  };
  let event: { amplitude: number; value: number } | null = null;
  const passed = (u: number, v: number) => (sign === 1 ? u - 1 : -v);
  solver.solve(right, 0, [u0, slope0], -LONGEST / decay, (_, from, to, y, dense) => {
    if (dense === undefined || passed(y[0] ?? 0, y[1] ?? 0) < 0) return;
    let [before, after] = [from, to];
    for (let k = 0; k < BISECTIONS; k += 1) {
      const middle = (before + after) / 2;
      if (passed(dense(0, middle), dense(1, middle)) < 0) before = middle;
      else after = middle;
    }
    const u = dense(0, after);
    const v = dense(1, after);
    event = { amplitude: START * Math.exp(-decay * after), value: sign === 1 ? -v : 1 - u };
    return false;
  });
  if (event === null) throw new Error("The integration met no event.");
  return event;
}

/** More e-folds than from START to any turning point. */
const LONGEST = 60;

export function relativeError(value: number, estimate: Estimate): number {
  return Math.abs(value / estimate.value - 1);
}
