import type { Orbit, OrbitPoint, PlaneWindow, Trajectory } from "../../solvers/index.ts";
import {
  describeProcess,
  fixedPoint,
  portraitOrbits,
  processPlane,
  profileConstants,
  profileSlopeAt,
  zerosOf,
} from "../../solvers/index.ts";
import { shortError } from "../counts/law.ts";
import type { PortraitData } from "./model.ts";

const POINTS = 141;
const MOST_ORBITS = 11;
/** How far the window reaches beyond the trajectory, as a share of it. */
const MARGIN = 0.1;
/** Least share of the window's height on either side of w′ = 0. */
const BESIDE = 0.22;
/** Where w(x, ·) has no end, the trajectory is drawn to here. */
const ENDLESS = 2;
/** How near an end that is not attained. */
const SHORT_OF = 1 - 1e-3;

/** The phase plane of a process: w′ as a function of w = s along its trajectory, the fixed points, and other orbits. */
export function processPortrait(trajectory: Trajectory): PortraitData {
  const { s0, slopeAtBarrier, limit } = profileConstants(trajectory);
  const turning = "refused" in s0 ? null : s0.value;
  const top = turning ?? (trajectory.edge === null ? ENDLESS : trajectory.edge.s * SHORT_OF);
  const rising = curve(trajectory, 0, limit.value);
  const falling = curve(trajectory, top, limit.value);
  const drawn = [rising, falling].filter((orbit) => orbit.length > 1);
  const window = windowAbout(drawn, top);
  const plane = processPlane(trajectory.model);
  const { extinctionProbability } = describeProcess(trajectory.model);
  const zeros = zerosOf(plane.reaction, window.w[0], window.w[1], [1, extinctionProbability.value]);
  const fixedPoints = zeros.map((w) => fixedPoint(plane, w, plane.slope(w)));
  const leaves = rising.length > 1 && !("refused" in slopeAtBarrier);
  return {
    variable: "w",
    window,
    fixedPoints,
    trajectory: drawn,
    orbits: portraitOrbits(plane, window, fixedPoints, drawn, MOST_ORBITS),
    slopeAtBarrier: leaves ? slopeAtBarrier.value : null,
    s0: turning !== null && turning > 1 ? turning : null,
    remarks: ["In ink: the trajectory on which every w(x, s) lies.", ...("refused" in s0 ? [s0.refused] : [])],
  };
}

/** From the slope at w = s over s between two ends, points closer at both, where the curve bends like a root. */
function curve(trajectory: Trajectory, from: number, to: number): Orbit {
  if (from === to) return [];
  const points: OrbitPoint[] = [];
  for (let index = 0; index < POINTS; index += 1) {
    const share = (1 - Math.cos((Math.PI * index) / (POINTS - 1))) / 2;
    const w = index === 0 ? from : index === POINTS - 1 ? to : from + (to - from) * share;
    const slope = profileSlopeAt(trajectory, 0, w);
    if ("refused" in slope) continue;
    // at its limit w stands still: what is not 0 there is the limit's own rounding
    points.push({ w, slope: w === to ? 0 : slope.value, error: shortError(slope.error) });
  }
  return points;
}

function windowAbout(curves: readonly Orbit[], top: number): PlaneWindow {
  const slopes = curves.flatMap((orbit) => orbit.map(({ slope }) => slope));
  const [least, most] = [Math.min(0, ...slopes), Math.max(0, ...slopes)];
  const height = most - least;
  const margin = MARGIN * height;
  return {
    w: [-MARGIN * Math.max(1, top), top + MARGIN * Math.max(1, top)],
    slope: [Math.min(least - margin, -BESIDE * height), Math.max(most + margin, BESIDE * height)],
  };
}
