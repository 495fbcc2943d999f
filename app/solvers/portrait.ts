import type { OrbitPoint, PlaneWindow } from "./orbit.ts";
import { traceOrbit } from "./orbit.ts";
import type { FixedPoint, Plane } from "./phase-plane.ts";

/** One curve of a portrait, with x increasing along it. */
export type Orbit = readonly OrbitPoint[];

/** How far from a saddle its orbits are begun, as a share of the window. */
const OFFSET = 2 ** -11;
/** Candidates for further orbits stand on a grid of so many a side. */
const GRID = 13;
/** Further orbits are begun at least so far from all others, as a share of the window. */
const APART = 0.11;

/** Orbits that fill a window of the phase plane about curves that are drawn in it already: both orbits that leave and both that
 *  reach each saddle, then others, begun where the window is emptiest.
 *  Source: B. Jobard, W. Lefer, Visualization in Scientific Computing '97, 43–55, for beginning apart from all others.
 *  @param drawn curves in the window   @param most orbits at most */
export function portraitOrbits(
  plane: Plane,
  window: PlaneWindow,
  points: readonly FixedPoint[],
  drawn: readonly Orbit[],
  most: number,
): readonly Orbit[] {
  const stops = points.map(({ w }) => w);
  const isNew = (orbit: Orbit): boolean => orbit.length > 4;
  const separatrices = points
    .filter(({ kind }) => kind === "saddle")
    .flatMap((saddle) => saddleOrbits(plane, window, saddle, stops))
    .filter((orbit) => isNew(orbit) && !isAmong(orbit, drawn, window));
  const orbits = separatrices.slice(0, most);
  const crowd = new Crowd(window, [...drawn, ...orbits], stops);
  while (orbits.length < most) {
    const start = crowd.emptiest();
    if (start === null) break;
    const orbit = throughPoint(plane, window, start, stops);
    crowd.add(orbit);
    crowd.add([{ w: start[0], slope: start[1], error: 0 }]);
    if (isNew(orbit)) orbits.push(orbit);
  }
  return orbits;
}

/** The two orbits that leave a saddle and the two that reach it.
 *  Source: the eigenvector of λ is (1, λ). */
export function saddleOrbits(
  plane: Plane,
  window: PlaneWindow,
  saddle: FixedPoint,
  stops: readonly number[],
): readonly Orbit[] {
  const others = stops.filter((stop) => stop !== saddle.w);
  const [stable, unstable] = saddle.eigenvalues;
  const width = window.w[1] - window.w[0];
  return [unstable, stable].flatMap((eigenvalue) =>
    [1, -1].map((side) => {
      const offset = side * OFFSET * width;
      const start = onManifold(plane, saddle, eigenvalue, offset);
      if (start === null) return [];
      const way = eigenvalue > 0 ? 1 : -1;
      const traced = traceOrbit(plane, [start.w, start.slope], way, window, others).map((point) => ({
        ...point,
        error: point.error + start.error,
      }));
      const whole: Orbit = [{ w: saddle.w, slope: 0, error: 0 }, ...traced];
      return way === 1 ? whole : [...whole].reverse();
    }),
  );
}

/** A point of a saddle's manifold: p = λ v + c v², c from f″; the error is the size of what that leaves out. */
function onManifold(plane: Plane, saddle: FixedPoint, eigenvalue: number, v: number): OrbitPoint | null {
  const f = (at: number) => plane.reaction(saddle.w + at);
  const second = (f(v) + f(-v) - 2 * f(0)) / (v * v);
  const c = -second / 2 / (3 * plane.diffusion * eigenvalue + plane.damping);
  const slope = eigenvalue * v + c * v * v;
  return Number.isFinite(slope) ? { w: saddle.w + v, slope, error: Math.abs(v) ** 3 * (1 + Math.abs(c)) ** 2 } : null;
}

/** The orbit through a point, both ways. */
function throughPoint(
  plane: Plane,
  window: PlaneWindow,
  at: readonly [number, number],
  stops: readonly number[],
): Orbit {
  const before = traceOrbit(plane, at, -1, window, stops);
  const after = traceOrbit(plane, at, 1, window, stops);
  return [...before.slice(1).reverse(), ...after];
}

/** Whether an orbit runs along one that is drawn. */
function isAmong(orbit: Orbit, drawn: readonly Orbit[], window: PlaneWindow): boolean {
  const middle = orbit[Math.floor(orbit.length / 2)];
  if (middle === undefined) return false;
  const [x, y] = shareOf(window, middle);
  return drawn.some((curve) =>
    curve.some((point) => {
      const [a, b] = shareOf(window, point);
      return Math.hypot(x - a, y - b) < SAME;
    }),
  );
}

const SAME = 0.01;

/** Candidates on a grid with their distance from all curves so far, in shares of the window. */
class Crowd {
  private readonly window: PlaneWindow;
  private readonly candidates: { readonly x: number; readonly y: number; square: number }[] = [];

  constructor(window: PlaneWindow, curves: readonly Orbit[], stops: readonly number[]) {
    this.window = window;
    for (let i = 0; i < GRID; i += 1)
      for (let j = 0; j < GRID; j += 1)
        this.candidates.push({ x: (i + 0.5) / GRID, y: (j + 0.5) / GRID, square: Number.POSITIVE_INFINITY });
    for (const curve of curves) this.add(curve);
    this.add(stops.map((w) => ({ w, slope: 0, error: 0 })));
  }

  add(curve: Orbit): void {
    for (const point of curve) {
      const [a, b] = shareOf(this.window, point);
      for (const candidate of this.candidates) {
        const square = (candidate.x - a) ** 2 + (candidate.y - b) ** 2;
        if (square < candidate.square) candidate.square = square;
      }
    }
  }

  /** The candidate farthest from all curves; null where none is far enough. */
  emptiest(): readonly [number, number] | null {
    const best = this.candidates.reduce((a, b) => (b.square > a.square ? b : a));
    if (best.square <= APART * APART) return null;
    return [between(this.window.w, best.x), between(this.window.slope, best.y)];
  }
}

function shareOf({ w, slope }: PlaneWindow, point: OrbitPoint): readonly [number, number] {
  return [(point.w - w[0]) / (w[1] - w[0]), (point.slope - slope[0]) / (slope[1] - slope[0])];
}

function between([low, high]: readonly [number, number], share: number): number {
  return low + share * (high - low);
}
