import type { Plane } from "./phase-plane.ts";

/** A point of the plane (w, w′) with bounds on the error of w′ at that w. */
export interface OrbitPoint {
  readonly w: number;
  readonly slope: number;
  readonly error: number;
}

/** The part of the plane that is looked at. */
export interface PlaneWindow {
  readonly w: readonly [number, number];
  readonly slope: readonly [number, number];
}

type State = readonly [number, number];

/** Longest step, as a share of the window. */
const LONGEST = 0.02;
/** Relative to the window, and how near a fixed point an orbit ends. */
const TOLERANCE = 1e-10;
const NEAR_FIXED = 0.004;
const MOST_STEPS = 3000;
const SMALLEST_STEP = 2 ** -40;
const SAFETY = 0.9;
const GROWTH = 2;
const SHRINK = 0.2;

/** Follows the solution from a point until it leaves the window or comes near a fixed point.
 *  Source: J. R. Dormand, P. J. Prince, J. Comput. Appl. Math. 6 (1980) 19–26, of order 5(4); errors from the same steps halved.
 *  @param way 1 with x increasing, −1 with x decreasing   @param stops fixed points' w
 *  @returns points from the given one on, in the order of the way; that one alone where there is no solution */
export function traceOrbit(
  plane: Plane,
  from: State,
  way: 1 | -1,
  window: PlaneWindow,
  stops: readonly number[],
): readonly OrbitPoint[] {
  const size: State = [window.w[1] - window.w[0], window.slope[1] - window.slope[0]];
  const points: OrbitPoint[] = [{ w: from[0], slope: from[1], error: 0 }];
  let coarse = from;
  let fine = from;
  const first = LONGEST / Math.max(SMALLEST_STEP, speedAt(plane, from, size));
  let step = first;
  for (let count = 0; count < MOST_STEPS; count += 1) {
    const tried = dormandPrince(plane, fine, way * step);
    const off = Math.hypot(tried.error[0] / size[0], tried.error[1] / size[1]) / TOLERANCE;
    const moved = Math.hypot((tried.to[0] - fine[0]) / size[0], (tried.to[1] - fine[1]) / size[1]);
    const isIn = inside(tried.to, window);
    if (!(off <= 1 && moved <= 2 * LONGEST && isIn)) {
      if ((!isIn && moved < LONGEST / 64) || step < SMALLEST_STEP * first) break;
      step *= isIn && Number.isFinite(off) ? Math.max(SHRINK, Math.min(1 / 2, SAFETY * off ** (-1 / 5))) : 1 / 2;
      continue;
    }
    const half = dormandPrince(plane, fine, (way * step) / 2).to;
    fine = dormandPrince(plane, half, (way * step) / 2).to;
    coarse = dormandPrince(plane, coarse, way * step).to;
    points.push({ w: fine[0], slope: fine[1], error: slopeError(plane, fine, coarse) });
    if (isNearFixed(fine, size, stops)) break;
    const room = LONGEST / Math.max(moved / step, Number.MIN_VALUE);
    step = Math.min(room, step * Math.min(GROWTH, SAFETY * Math.max(off, 1e-8) ** (-1 / 5)));
  }
  return points;
}

/** How far the slope is off at that w: the difference of both solutions, moved along the orbit to the same w. */
function slopeError(plane: Plane, fine: State, coarse: State): number {
  const along = fieldAt(plane, fine);
  const across = Math.abs(along[0]) > Number.MIN_VALUE ? Math.abs(along[1] / along[0]) : 0;
  return (
    Math.abs(fine[1] - coarse[1]) +
    Math.min(across, 1e6) * Math.abs(fine[0] - coarse[0]) +
    4 * Number.EPSILON * Math.abs(fine[1])
  );
}

function speedAt(plane: Plane, at: State, size: State): number {
  const [dw, dp] = fieldAt(plane, at);
  return Math.hypot(dw / size[0], dp / size[1]);
}

function inside([w, slope]: State, window: PlaneWindow): boolean {
  return w >= window.w[0] && w <= window.w[1] && slope >= window.slope[0] && slope <= window.slope[1];
}

function isNearFixed([w, slope]: State, size: State, stops: readonly number[]): boolean {
  return stops.some((stop) => Math.hypot((w - stop) / size[0], slope / size[1]) < NEAR_FIXED);
}

function fieldAt({ diffusion, damping, reaction }: Plane, [w, slope]: State): State {
  return [slope, -(damping * slope + reaction(w)) / diffusion];
}

/** Coefficients of the stages, of the fifth-order result (the last row), and of its difference from the fourth-order one. */
const STAGES: readonly (readonly number[])[] = [
  [],
  [1 / 5],
  [3 / 40, 9 / 40],
  [44 / 45, -56 / 15, 32 / 9],
  [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
  [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
  [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
];
const DIFFERENCE = [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40];

const STAGE_COUNT = STAGES.length;
/** w′ and p′ at each stage: filled again at each step, so that steps allocate little. */
const fieldW = new Float64Array(STAGE_COUNT);
const fieldSlope = new Float64Array(STAGE_COUNT);

/** One step of length h with its local error. */
function dormandPrince({ diffusion, damping, reaction }: Plane, from: State, h: number): { to: State; error: State } {
  let [w, slope] = from;
  for (let stage = 0; stage < STAGE_COUNT; stage += 1) {
    const row = STAGES[stage] as readonly number[];
    [w, slope] = from;
    for (let i = 0; i < stage; i += 1) {
      const weight = h * (row[i] as number);
      w += weight * (fieldW[i] as number);
      slope += weight * (fieldSlope[i] as number);
    }
    fieldW[stage] = slope;
    fieldSlope[stage] = -(damping * slope + reaction(w)) / diffusion;
  }
  let errorW = 0;
  let errorSlope = 0;
  for (let i = 0; i < STAGE_COUNT; i += 1) {
    errorW += h * (DIFFERENCE[i] as number) * (fieldW[i] as number);
    errorSlope += h * (DIFFERENCE[i] as number) * (fieldSlope[i] as number);
  }
  return { to: [w, slope], error: [errorW, errorSlope] };
}
