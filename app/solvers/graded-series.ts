import type { Branching } from "./offspring.ts";
import { cauchy, PairSeries } from "./pair-series.ts";
import { add, divide, multiply, negate, pair, scale, subtract, ZERO } from "./pairs.ts";
import type { Pair } from "./types.ts";

/** Power series in two variables, Σ c_ij ζ^i η^j over i + weight·j ≤ order, as double-doubles: one row for each power of η. */
export class GradedSeries {
  readonly order: number;
  readonly weight: number;
  readonly rows: readonly PairSeries[];

  constructor(order: number, weight: number) {
    this.order = order;
    this.weight = weight;
    const count = Math.floor(order / weight) + 1;
    this.rows = Array.from({ length: count }, (_, j) => new PairSeries(order - j * weight + 1));
  }

  at(i: number, j: number): Pair {
    return (this.rows[j] as PairSeries).at(i);
  }

  set(i: number, j: number, value: Pair): void {
    (this.rows[j] as PairSeries).set(i, value);
  }

  /** Powers (i, j) in an order in which whatever divides one comes before it, and of equal i + weight·j the larger j. */
  *powers(): Generator<readonly [i: number, j: number]> {
    for (let grade = 0; grade <= this.order; grade += 1)
      for (let j = Math.floor(grade / this.weight); j >= 0; j -= 1) yield [grade - j * this.weight, j];
  }
}

/** Coefficient of ζ^i η^j of a·b. */
function product(a: GradedSeries, b: GradedSeries, i: number, j: number): Pair {
  let sum = ZERO;
  for (let k = 0; k <= j; k += 1) sum = add(sum, cauchy(a.rows[k] as PairSeries, b.rows[j - k] as PairSeries, i, 0, i));
  return sum;
}

/** M of a series u without constant term, power by power in the order of `powers`: `source` gives the coefficient of M(u), which
 *  does not depend on that of u because M has no linear part; `settle` is told when u has its own. */
export interface GradedComposer {
  source(i: number, j: number): Pair;
  settle(i: number, j: number): void;
}

/** The composer of an offspring law for the series u, which its caller fills. */
export function gradedComposer(law: Branching, u: GradedSeries): GradedComposer {
  switch (law.law) {
    case "geometric":
      return composeGeometric(law.mean, u);
    case "poisson":
      return composePoisson(law.mean, u);
    case "finite":
      return composePolynomial(law.aboutOne, u);
  }
}

/** Σ a_k u^k by Horner's rule on series: rows[k] = a_k + u·rows[k + 1], M = u·rows[1]. */
function composePolynomial(a: readonly Pair[], u: GradedSeries): GradedComposer {
  const degree = a.length - 1;
  const rows = Array.from({ length: degree }, () => new GradedSeries(u.order, u.weight));
  for (let k = 1; k < degree; k += 1) rows[k]?.set(0, 0, a[k] as Pair);
  return {
    source(i, j) {
      if (i + j === 0) return ZERO;
      for (let k = degree - 2; k >= 1; k -= 1) rows[k]?.set(i, j, product(u, rows[k + 1] as GradedSeries, i, j));
      return product(u, rows[1] as GradedSeries, i, j);
    },
    settle(i, j) {
      if (i + j === 0) return;
      for (let k = degree - 1; k >= 1; k -= 1) {
        const row = rows[k] as GradedSeries;
        row.set(i, j, add(row.at(i, j), multiply(a[k + 1] as Pair, u.at(i, j))));
      }
    },
  };
}

/** M (1 + q) = q² with q = mean·u. */
function composeGeometric(mean: Pair, u: GradedSeries): GradedComposer {
  const q = new GradedSeries(u.order, u.weight);
  const m = new GradedSeries(u.order, u.weight);
  return {
    source(i, j) {
      m.set(i, j, subtract(product(q, q, i, j), product(q, m, i, j)));
      return m.at(i, j);
    },
    settle(i, j) {
      q.set(i, j, multiply(mean, u.at(i, j)));
    },
  };
}

/** E = e^{−q}: for the derivation that multiplies each power by its grade, E' = −q' E; M = E − 1 + q. */
function composePoisson(mean: Pair, u: GradedSeries): GradedComposer {
  const e = new GradedSeries(u.order, u.weight);
  const slope = new GradedSeries(u.order, u.weight);
  e.set(0, 0, pair(1));
  const gradeOf = (i: number, j: number) => i + u.weight * j;
  return {
    source(i, j) {
      if (i + j === 0) return ZERO;
      e.set(i, j, divide(negate(product(slope, e, i, j)), pair(gradeOf(i, j))));
      return e.at(i, j);
    },
    settle(i, j) {
      if (i + j === 0) return;
      const q = multiply(mean, u.at(i, j));
      slope.set(i, j, scale(q, gradeOf(i, j)));
      e.set(i, j, subtract(e.at(i, j), q));
    },
  };
}
