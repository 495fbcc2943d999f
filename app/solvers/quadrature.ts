/** A quadrature rule on [−1, 1]. */
export interface Rule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const rules = new Map<number, Rule>();
const NEWTON_ROUNDS = 12;
/** The square of this step is beyond the double's accuracy. */
const CONVERGED = 1e-10;

/** The Gauss–Legendre rule with n nodes, in increasing order; exact for polynomials of degree 2n − 1.
 *  Method: Newton's method on the Legendre polynomial from Tricomi's approximation of its roots.
 *  Source: P. J. Davis, P. Rabinowitz, Methods of Numerical Integration (1984), section 2.7. */
export function gaussLegendre(n: number): Rule {
  const known = rules.get(n);
  if (known !== undefined) return known;
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < (n + 1) >> 1; i += 1) {
    let x = (1 - (n - 1) / (8 * n ** 3)) * Math.cos((Math.PI * (4 * i + 3)) / (4 * n + 2));
    let slope = 1;
    for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
      const { value, derivative } = legendre(n, x);
      slope = derivative;
      const step = value / derivative;
      x -= step;
      if (Math.abs(step) < CONVERGED) break;
    }
    slope = legendre(n, x).derivative;
    nodes[n - 1 - i] = x;
    nodes[i] = -x;
    const weight = 2 / ((1 - x) * (1 + x) * slope * slope);
    weights[n - 1 - i] = weight;
    weights[i] = weight;
  }
  if (n % 2 === 1) nodes[(n - 1) >> 1] = 0;
  const rule = { nodes, weights };
  rules.set(n, rule);
  return rule;
}

/** P_n and P_n' at x by the three-term recursion. */
function legendre(n: number, x: number): { value: number; derivative: number } {
  let previous = 1;
  let value = x;
  for (let k = 2; k <= n; k += 1) {
    const next = ((2 * k - 1) * x * value - (k - 1) * previous) / k;
    previous = value;
    value = next;
  }
  return { value, derivative: (n * (x * value - previous)) / (x * x - 1) };
}
