import { linearise } from "./linear.ts";
import { nonlinearity } from "./offspring.ts";
import type { ProcessModel } from "./types.ts";

/** The phase plane (w, p), p = w′, of D w″ + damping w′ + f(w) = 0: w′ = p, p′ = −(damping p + f(w))/D. */
export interface Plane {
  /** D > 0 [length²/time] */
  readonly diffusion: number;
  /** the drift of a process, the speed of a front [length/time] */
  readonly damping: number;
  /** f [1/time]; not finite where it has no value */
  readonly reaction: (w: number) => number;
}

export type FixedPointKind =
  | "saddle"
  | "stable node"
  | "unstable node"
  | "stable focus"
  | "unstable focus"
  | "centre"
  | "degenerate point";

/** A point (w, 0) with f(w) = 0 and what the linear equation there says of it. */
export interface FixedPoint {
  readonly w: number;
  readonly kind: FixedPointKind;
  /** real parts and the imaginary part of the two eigenvalues [1/length]; imaginary 0 where both are real */
  readonly eigenvalues: readonly [number, number];
  readonly imaginary: number;
}

/** Below this, relative to damping², a discriminant is 0: the parameters were meant to be critical. */
const CRITICAL_TOLERANCE = 4 * Number.EPSILON;

/** What the linear equation at a fixed point says: eigenvalues (−damping ± √(damping² − 4 D f′))/(2 D).
 *  Source: common practice, e.g. J. D. Murray, Mathematical Biology I (2002), appendix A, for the kinds.
 *  @param w where f is 0   @param slope f′(w) [1/time] */
export function fixedPoint(plane: Omit<Plane, "reaction">, w: number, slope: number): FixedPoint {
  const { damping, diffusion } = plane;
  const exact = damping * damping - 4 * diffusion * slope;
  const discriminant = Math.abs(exact) <= CRITICAL_TOLERANCE * damping * damping ? 0 : exact;
  const middle = -damping / (2 * diffusion);
  if (discriminant < 0) {
    const imaginary = Math.sqrt(-discriminant) / (2 * diffusion);
    const kind = damping === 0 ? "centre" : damping > 0 ? "stable focus" : "unstable focus";
    return { w, kind, eigenvalues: [middle, middle], imaginary };
  }
  // the eigenvalue of larger size first found, the other from their product f′/D, without cancellation
  const large = middle - (damping >= 0 ? 1 : -1) * (Math.sqrt(discriminant) / (2 * diffusion));
  const small = large === 0 ? 0 : slope / diffusion / large;
  const eigenvalues = [Math.min(large, small), Math.max(large, small)] as const;
  const kind = slope === 0 ? "degenerate point" : slope < 0 ? "saddle" : damping > 0 ? "stable node" : "unstable node";
  return { w, kind, eigenvalues, imaginary: 0 };
}

/** The phase plane of a process: f(w) = rate (G(w) − w), evaluated without cancellation near w = 1; f′ beside it [1/time].
 *  Source: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143.
 *  @throws SolverError "bad_parameter" as describeProcess. */
export function processPlane(model: ProcessModel): Plane & { readonly slope: (w: number) => number } {
  const { law } = linearise(model);
  const excess = law.excess[0];
  const pole = law.law === "geometric" ? 1 + 1 / law.mean[0] : Number.POSITIVE_INFINITY;
  return {
    diffusion: model.diffusion,
    damping: model.drift,
    reaction: (w) => (w >= pole ? Number.NaN : model.rate * (nonlinearity(law, 1 - w).value - excess * (1 - w))),
    slope: (w) => -model.rate * (nonlinearity(law, 1 - w).derivative - excess),
  };
}
