import { Solver } from "odex";

/** What the phase plane gives by a general integrator: the constants that the trajectory's two ends carry. */
export interface PhasePlaneConstants {
  readonly amplitude: number;
  readonly s0: number;
  readonly slopeAtBarrier: number;
}

/** Relative size of the series' start: its third term, left out, is below a rounding. */
const START = 1e-6;
const TOLERANCE = 1e-13;
const FARTHEST = 60;

/**
 * The trajectory of D w″ + mu w′ + rate (w² - w) = 0 (binary branching) that leaves w = 1 along its fast direction,
 * integrated backward by odex's extrapolation method in v = 1 - w: once to v = 1, once with v < 0 to the turning point.
 */
export function integrateTrajectory(mu: number, rate: number, diffusion: number): PhasePlaneConstants {
  const decay = (mu + Math.sqrt(mu * mu - 4 * diffusion * rate)) / (2 * diffusion);
  // v = z + c z² + ...: [4 D decay² - 2 mu decay + rate] c = rate.
  const c = rate / (4 * diffusion * decay * decay - 2 * mu * decay + rate);
  const end = (
    sign: number,
    reached: (v: number, slope: number) => number,
  ): { x: number; v: number; slope: number } => {
    const z = sign * START;
    const solver = new Solver(2);
    solver.absoluteTolerance = TOLERANCE * START;
    solver.relativeTolerance = TOLERANCE;
    solver.denseOutput = true;
    let found: { x: number; v: number; slope: number } | null = null;
    solver.solve(
      (_x, [v = 0, slope = 0]) => [slope, -(mu * slope + rate * (v - v * v)) / diffusion],
      0,
      [z + c * z * z, -decay * (z + 2 * c * z * z)],
      -FARTHEST,
      (_n, before, x, [v = 0, slope = 0], dense) => {
        if (dense === undefined || reached(v, slope) < 0) return undefined;
        const at = bisect((y) => reached(dense(0, y), dense(1, y)), before, x);
        found = { x: at, v: dense(0, at), slope: dense(1, at) };
        return false;
      },
    );
    if (found === null) throw new Error("The integration did not reach the end of the trajectory.");
    return found;
  };
  const barrier = end(1, (v) => v - 1);
  const turning = end(-1, (_v, slope) => -slope);
  return { amplitude: START * Math.exp(-decay * barrier.x), s0: 1 - turning.v, slopeAtBarrier: -barrier.slope };
}

/** The place between a and b where f changes from negative to not negative. */
function bisect(f: (x: number) => number, a: number, b: number): number {
  let low = a;
  let high = b;
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (f(middle) < 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
