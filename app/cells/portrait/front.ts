import type { Formula } from "../../formulas/index.ts";
import { toDouble } from "../../formulas/index.ts";
import type { FixedPoint, Orbit, Plane, PlaneWindow } from "../../solvers/index.ts";
import { fixedPoint, portraitOrbits, saddleOrbits, zerosOf } from "../../solvers/index.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import { shortNumber } from "../values.ts";
import type { FrontModel, PortraitData } from "./model.ts";
import { withArticle } from "./view.ts";

/** u from here to there is drawn: beyond 0 and 1, to show where other orbits go. */
const REACH: readonly [number, number] = [-0.25, 1.2];
const MOST_ORBITS = 10;
/** How far the window reaches beyond the front's orbit, as a share of its height, on its side of u′ = 0 and on the other. */
const BELOW = 1.25;
const ABOVE = 0.5;
/** What f(0) and f(1) may be by rounding alone, against f between. */
const ROUNDING = 1e-12;
const SAMPLES = 64;

interface Front {
  readonly plane: Plane;
  readonly formula: Formula;
  readonly context: ComputeContext;
}

/** The plane of a front, checked: f has values and zeros at 0 and 1. */
export function frontOf(model: FrontModel, context: ComputeContext): Front {
  const damping = context.number(model.speed, "speed", {});
  const diffusion = context.number(model.diffusion, "diffusion", { above: 0 });
  const reaction = (u: number): number => {
    const value = context.value(model.reaction, at(u));
    return value.type === "number" ? toDouble(value.quantity) : Number.NaN;
  };
  const size = sizeOf(model.reaction, reaction, context);
  for (const end of [0, 1]) {
    const value = reaction(end);
    if (Math.abs(value) > ROUNDING * size)
      throw new CellFault(
        "reaction",
        `\`reaction\` is ${shortNumber(value)} at u = ${end}; a front from 1 to 0 needs it to be 0 at both.`,
      );
  }
  return { plane: { diffusion, damping, reaction }, formula: model.reaction, context };
}

/** The phase plane of D u″ + speed u′ + f(u) = 0, with the orbit that leaves u = 1. */
export function frontPortrait(model: FrontModel, context: ComputeContext): { data: PortraitData; words: string } {
  const front = frontOf(model, context);
  const { plane } = front;
  const zeros = zerosOf(plane.reaction, REACH[0], REACH[1], [0, 1]);
  const fixedPoints = zeros.map((u) => fixedPoint(plane, u, slopeOf(front, u)));
  const drawn = leaving(front, fixedPoints);
  const window = windowAbout(front, drawn);
  return {
    data: {
      variable: "u",
      window,
      fixedPoints,
      trajectory: drawn.length === 0 ? [] : [drawn],
      orbits: portraitOrbits(plane, window, fixedPoints, drawn.length === 0 ? [] : [drawn], MOST_ORBITS),
      slopeAtBarrier: null,
      s0: null,
      remarks: remarksOn(drawn, fixedPoints),
    },
    words: `Orbits by Dormand and Prince's method; speed = ${plane.damping}, D = ${plane.diffusion}`,
  };
}

function at(u: number): Parameters<ComputeContext["value"]>[1] {
  return { u: { type: "number", quantity: { mantissa: u, exponent: 0, error: 0, se: 0 } } };
}

/** The largest |f| between 0 and 1. @throws CellFault where f has no value there, or is 0 throughout. */
function sizeOf(formula: Formula, reaction: (u: number) => number, context: ComputeContext): number {
  let size = 0;
  for (let i = 0; i <= SAMPLES; i += 1) {
    const u = i / SAMPLES;
    const value = reaction(u);
    if (!Number.isFinite(value)) {
      const told = context.value(formula, at(u));
      throw new CellFault(
        "reaction",
        `\`reaction\` has no value at u = ${u}${told.type === "refused" ? `: ${told.reason}` : "."}`,
      );
    }
    size = Math.max(size, Math.abs(value));
  }
  if (size === 0) throw new CellFault("reaction", "`reaction` is 0 from u = 0 to 1; nothing happens there.");
  return size;
}

/** f′(u), and exactly 0 where the formula's errors leave its sign open. */
function slopeOf({ formula, context }: Front, u: number): number {
  const point: Formula = { node: "number", value: u };
  const derivative: Formula = {
    node: "bind",
    binder: "derivative",
    body: formula,
    variable: "u",
    args: [point],
    at: 0,
  };
  const value = context.value(derivative);
  if (value.type !== "number") return Number.NaN;
  return Math.abs(value.quantity.mantissa) <= value.quantity.error ? 0 : toDouble(value.quantity);
}

/** The orbit that leaves the saddle u = 1 towards smaller u; none where 1 is no saddle. */
function leaving(front: Front, fixedPoints: readonly FixedPoint[]): Orbit {
  const saddle = fixedPoints.find(({ w, kind }) => w === 1 && kind === "saddle");
  if (saddle === undefined) return [];
  const { plane } = front;
  const size = sizeOf(front.formula, plane.reaction, front.context);
  const steepest = 4 * Math.sqrt(size / plane.diffusion) + 4 * (Math.abs(plane.damping) / plane.diffusion);
  const wide: PlaneWindow = { w: REACH, slope: [-steepest, steepest] };
  const stops = fixedPoints.map(({ w }) => w);
  // of the orbits that leave, the second goes to smaller u
  return saddleOrbits(plane, wide, saddle, stops)[1] ?? [];
}

function windowAbout(front: Front, drawn: Orbit): PlaneWindow {
  const slopes = drawn.map(({ slope }) => slope);
  const least = Math.min(...slopes, 0);
  const fallback = Math.sqrt(sizeOf(front.formula, front.plane.reaction, front.context) / front.plane.diffusion);
  const depth = least < 0 ? -least : fallback;
  return { w: REACH, slope: [-BELOW * depth, Math.max(ABOVE * depth, ...slopes.map((slope) => BELOW * slope))] };
}

function remarksOn(drawn: Orbit, fixedPoints: readonly FixedPoint[]): string[] {
  if (drawn.length > 0) return ["In ink: the orbit that leaves u = 1 towards 0."];
  const kind = fixedPoints.find(({ w }) => w === 1)?.kind ?? "degenerate point";
  return [`No orbit is set apart: u = 1 is ${withArticle(kind)}, not a saddle that one orbit leaves towards 0.`];
}
