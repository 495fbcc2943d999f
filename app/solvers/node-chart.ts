import { GradedSeries, gradedComposer } from "./graded-series.ts";
import type { Branching } from "./offspring.ts";
import { add, divide, multiply, negate, ONE, pair, scale, subtract, toNumber, ZERO } from "./pairs.ts";
import type { Pair } from "./types.ts";

/** Coordinates in which every solution near w = 1 moves freely, in the regime `toward`, where 1 is a node with the two rates
 *  λ_s ≤ λ_b, d = λ_b/λ_s. With θ = d/d(λ_s x), u = 1 − w obeys (θ − 1)(θ − d) u = strength·M(u), strength = d/(mean − 1), and
 *
 *      u = Σ c_ij ζ^i η^j,    θζ = ζ,    θη = d η + resonance·ζ^m,    m the integer next to d,
 *
 *  so that ζ = e^{λ_s x} and, with g = d − m, η = a e^{d λ_s x} + resonance·ζ^m (e^{g λ_s x} − 1)/g. Taking ζ^m into η instead of
 *  dividing by m − d keeps all numbers of ordinary size as d passes through an integer. For m = 1 the linear part is η alone.
 *  Source: H. Poincaré's and H. Dulac's normal form of a node; V. I. Arnold, Geometrical Methods in the Theory of Ordinary
 *  Differential Equations (1983), section 24. */
export interface NodeChart {
  /** d = λ_b/λ_s, and the integer next to it */
  readonly index: Pair;
  readonly nearest: number;
  /** d − nearest */
  readonly gap: Pair;
  readonly resonance: Pair;
  /** c_ij */
  readonly series: GradedSeries;
}

/** Terms in the slow coordinate alone; fewer where many powers of the fast one matter, or where the law is a long polynomial. */
const ORDERS: readonly (readonly [degree: number, order: number])[] = [
  [4, 96],
  [12, 64],
  [Number.POSITIVE_INFINITY, 40],
];
const LOW_INDEX_ORDER = 56;
const LOW_INDEX = 1.5;
/** Where few powers of η count, more terms cost little, and the singularity is small unless met far out. */
const HIGH_INDEX = 8;
const HIGH_FACTOR = 2;
/** Rows of powers of η kept at least. */
const LEAST_ROWS = 4;

/** Computes the coefficients order by order: the bracket (k − 1)(k − d), k = i + j d, is 0 only for the two linear terms, and for ζ^m. */
export function nodeChart(law: Branching, index: Pair): NodeChart {
  const nearest = Math.max(1, Math.round(index[0]));
  const gap = subtract(index, pair(nearest));
  const degree = law.law === "finite" ? law.aboutZero.length - 1 : 2;
  const byDegree = (ORDERS.find(([most]) => degree <= most) as readonly [number, number])[1];
  const order =
    index[0] < LOW_INDEX
      ? Math.min(LOW_INDEX_ORDER, byDegree)
      : index[0] > HIGH_INDEX
        ? HIGH_FACTOR * byDegree
        : byDegree;
  const series = new GradedSeries(order, Math.min(nearest, Math.floor(order / LEAST_ROWS)));
  const compose = gradedComposer(law, series);
  const strength = divide(index, law.excess);
  const unit = unitOf(law);
  let resonance = nearest === 1 ? negate(ONE) : ZERO;
  for (const [i, j] of series.powers()) {
    if (i + j === 1) {
      if (j === 1 || nearest > 1) series.set(i, j, unit);
    } else if (i + j > 1) {
      const source = subtract(
        multiply(strength, compose.source(i, j)),
        fed(series, { index, nearest, resonance }, i, j),
      );
      if (i === nearest && j === 0) resonance = divide(source, scale(unit, nearest - 1));
      else series.set(i, j, divide(source, bracket(index, i, j)));
    }
    compose.settle(i, j);
  }
  return { index, nearest, gap, resonance, series };
}

/** The size of u at which M(u) is comparable with (mean − 1) u: there the coefficients are of the order of 1. */
function unitOf(law: Branching): Pair {
  return pair(2 ** Math.min(0, Math.round(Math.log2((2 * law.excess[0]) / law.mean[0] ** 2))));
}

function bracket(index: Pair, i: number, j: number): Pair {
  const k = add(pair(i), scale(index, j));
  return multiply(subtract(k, ONE), subtract(k, index));
}

/** What (θ − 1)(θ − d) brings to ζ^i η^j from the powers with more of η, through the resonance. */
function fed(
  series: GradedSeries,
  { index, nearest, resonance }: Pick<NodeChart, "index" | "nearest" | "resonance">,
  i: number,
  j: number,
): Pair {
  let sum = ZERO;
  // (θ − 1)(θ − d) ζ^a η^b contains b R (k + k′ − 1 − d) ζ^{a + m} η^{b − 1}, k and k′ the rates of the two powers
  if (i >= nearest && has(series, i - nearest, j + 1)) {
    const before = add(pair(i - nearest), scale(index, j + 1));
    const after = add(pair(i), scale(index, j));
    const factor = subtract(subtract(add(before, after), ONE), index);
    sum = add(sum, multiply(multiply(resonance, scale(factor, j + 1)), series.at(i - nearest, j + 1)));
  }
  if (i >= 2 * nearest && has(series, i - 2 * nearest, j + 2)) {
    const square = multiply(resonance, resonance);
    sum = add(sum, multiply(scale(square, (j + 1) * (j + 2)), series.at(i - 2 * nearest, j + 2)));
  }
  return sum;
}

function has(series: GradedSeries, i: number, j: number): boolean {
  return j < series.rows.length && i + j * series.weight <= series.order;
}

/** u and θu at real (ζ, η), in double-doubles. */
export function chartValue(chart: NodeChart, zeta: Pair, eta: Pair): { u: Pair; slope: Pair } {
  const { series, index, nearest, resonance } = chart;
  let u = ZERO;
  let byEta = ZERO;
  let byZeta = ZERO;
  for (let j = series.rows.length - 1; j >= 0; j -= 1) {
    const row = (series.rows[j] as GradedSeries["rows"][number]).evaluate(zeta, series.order - j * series.weight);
    byEta = add(multiply(byEta, eta), u);
    u = add(multiply(u, eta), row.value);
    byZeta = add(multiply(byZeta, eta), row.derivative);
  }
  let power = resonance;
  for (let k = 0; k < nearest && power[0] !== 0; k += 1) power = multiply(power, zeta);
  const fast = add(multiply(index, eta), power);
  return { u, slope: add(multiply(zeta, byZeta), multiply(fast, byEta)) };
}

/** Size of the terms of the highest grades at (|ζ|, |η|), which is what the cut leaves out: of all of them relative to u, and of
 *  those with a power of η relative to the first of these, since beside the cut only they have an imaginary part. */
export function chartRest(chart: NodeChart, zeta: number, eta: number): { whole: number; fast: number } {
  const { series } = chart;
  const rests = series.rows.map((row, j) => {
    const last = series.order - j * series.weight;
    let rest = 0;
    for (let i = Math.max(0, last - GRADES_MEASURED); i <= last; i += 1)
      rest += Math.abs(row.high[i] as number) * zeta ** i * eta ** j;
    return rest;
  });
  const fastFirst = toNumber(series.at(0, 1)) * eta;
  const fast = rests.slice(1).reduce((sum, rest) => sum + rest, 0);
  return {
    whole: ((rests[0] ?? 0) + fast) / (toNumber(series.at(1, 0)) * zeta + fastFirst),
    fast: fast === 0 ? 0 : fast / fastFirst,
  };
}

const GRADES_MEASURED = 3;
