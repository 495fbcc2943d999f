import { type Fixed, log2Of } from "./fixed.ts";
import { at, composer, evaluate, type FixedLaw } from "./generating.ts";

/** D w″ + drift w′ + rate (G(w) − w) = 0 in ξ = decay·x:  w″ = −damping w′ − strength (G(w) − w). */
export interface Equation {
  readonly law: FixedLaw;
  /** drift/(D decay) and rate/(D decay²) */
  readonly damping: bigint;
  readonly strength: bigint;
}

/** A Taylor expansion of w about ξ, used down to the next one's ξ. */
export interface Segment {
  readonly xi: bigint;
  readonly series: readonly bigint[];
}

/** One side of a trajectory that leaves a fixed point: expansions of decreasing ξ, the first one at the edge of the power series in
 *  z = ±e^{−ξ}; `turning` is where w′ = 0, if the walk met it. */
export interface Branch {
  readonly segments: readonly Segment[];
  /** where the last segment ends */
  readonly end: bigint;
  readonly turning: Segment | null;
}

/** More expansions than are needed by a trajectory that ends; one that creeps towards another fixed point is cut here. */
const MOST_SEGMENTS = 400;
/** Share of the damping's own scale that one step may take, in multiples of the order. */
const DAMPING_SHARE = 0.2;

/** Walks from (ξ, w, w′) towards decreasing ξ until w′ changes sign or `passed` says so. A sign that changes by rounding, where w creeps
 *  towards a fixed point, is no turning: w″ is nothing there too. */
export function walkBranch(
  f: Fixed,
  equation: Equation,
  start: { xi: bigint; value: bigint; slope: bigint },
  order: number,
  passed: (value: bigint) => boolean,
): Branch {
  const segments: Segment[] = [];
  let { xi, value, slope } = start;
  const sign = slope > 0n;
  while (segments.length < MOST_SEGMENTS) {
    const series = expand(f, equation, value, slope, order);
    segments.push({ xi, series });
    const step = -f.double(stepLength(f, equation, series, order));
    const next = evaluate(f, series, step);
    if (next.slope > 0n !== sign) {
      const h = zeroOf(f, derivative(series), step);
      const top = evaluate(f, series, h);
      const turned = expand(f, equation, top.value, 0n, order);
      const creeping = log2Of({ units: at(turned, 2), exponent: 0 }) < f.bits / 2;
      return { segments, end: xi + h, turning: creeping ? null : { xi: xi + h, series: turned } };
    }
    xi += step;
    ({ value, slope } = next);
    if (passed(value)) break;
  }
  return { segments, end: xi, turning: null };
}

/** Taylor coefficients of the solution with this state. */
export function expand(f: Fixed, equation: Equation, value: bigint, slope: bigint, order: number): bigint[] {
  const w = [value, slope];
  const compose = composer(f, equation.law, w);
  for (let k = 0; k + 2 <= order; k += 1) {
    const branching = f.multiply(equation.strength, compose(k) - at(w, k));
    const drag = BigInt(k + 1) * f.multiply(equation.damping, at(w, k + 1));
    w.push(-(branching + drag) / BigInt((k + 1) * (k + 2)));
  }
  return w;
}

/** The step over which the last two terms stay below 2^−bits; at most 1, beyond which the coefficients' own last bits would grow. */
function stepLength(f: Fixed, equation: Equation, series: readonly bigint[], order: number): number {
  let log = Math.min(0, Math.log2((DAMPING_SHARE * order) / (1 + Math.abs(f.toNumber(equation.damping)))));
  for (const k of [order - 1, order])
    log = Math.min(log, (-f.bits - log2Of({ units: at(series, k), exponent: -f.bits })) / k);
  return 2 ** log;
}

export function derivative(series: readonly bigint[]): bigint[] {
  return series.slice(1).map((c, k) => BigInt(k + 1) * c);
}

/** Halvings before Newton's method, which doubles the digits each round. */
const HALVINGS = 24;

/** The zero of a polynomial between 0 and `far`, where it has one. */
export function zeroOf(f: Fixed, series: readonly bigint[], far: bigint): bigint {
  const sign = at(series, 0) > 0n;
  let [near, beyond] = [0n, far];
  for (let round = 0; round < HALVINGS; round += 1) {
    const middle = (near + beyond) / 2n;
    if (evaluate(f, series, middle).value > 0n === sign) near = middle;
    else beyond = middle;
  }
  let root = (near + beyond) / 2n;
  for (let digits = HALVINGS / 2; digits < 2 * f.bits; digits *= 2) {
    const { value, slope } = evaluate(f, series, root);
    if (slope === 0n) break;
    root -= f.divide(value, slope);
  }
  return root;
}
