/** Power series in double precision, for the expansion at the square-root singularity. All are cut after `order`. */

/** a·b. */
export function multiplied(a: Float64Array, b: Float64Array, order: number): Float64Array {
  const product = new Float64Array(order + 1);
  for (let i = 0; i <= order && i < a.length; i += 1)
    for (let k = i; k <= order && k - i < b.length; k += 1)
      product[k] = (product[k] as number) + (a[i] as number) * (b[k - i] as number);
  return product;
}

/** Σ c_k v^k for a series v without constant term. */
export function composed(c: Float64Array, v: Float64Array, order: number): Float64Array {
  let value = new Float64Array(order + 1);
  for (let k = Math.min(order, c.length - 1); k >= 0; k -= 1) {
    value = new Float64Array(multiplied(value, v, order));
    value[0] = (value[0] as number) + (c[k] as number);
  }
  return value;
}

/** a^exponent for an integer exponent ≥ 1. */
export function raised(a: Float64Array, exponent: number, order: number): Float64Array {
  let result: Float64Array | null = null;
  let square = a;
  for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = result === null ? square : multiplied(result, square, order);
    if (rest > 1) square = multiplied(square, square, order);
  }
  return result ?? Float64Array.of(1);
}

/** The series y(r) = y_1 r + … with Σ_{k ≥ 2} c_k y^k = scale·r², y_1 > 0 (c_2 > 0): square root, then inversion order by order. */
export function inverseSquareRise(c: Float64Array, scale: number, order: number): Float64Array {
  // y √(Σ_{k ≥ 0} c_{k+2} y^k) = √scale r; h = that square root as a series in y
  const h = new Float64Array(order + 1);
  h[0] = Math.sqrt(c[2] as number);
  for (let k = 1; k <= order; k += 1) {
    let sum = c[k + 2] ?? 0;
    for (let i = 1; i < k; i += 1) sum -= (h[i] as number) * (h[k - i] as number);
    h[k] = sum / (2 * (h[0] as number));
  }
  const shifted = new Float64Array(order + 1);
  for (let k = 1; k <= order; k += 1) shifted[k] = h[k - 1] as number;
  const y = new Float64Array(order + 1);
  const root = Math.sqrt(scale);
  y[1] = root / (h[0] as number);
  for (let k = 2; k <= order; k += 1) {
    // with y_k = 0 so far, the coefficient of r^k is what h_0 y_k has to cancel
    y[k] = -(composed(shifted, y, k)[k] as number) / (h[0] as number);
  }
  return y;
}

/** Bernoulli polynomials B_0(x), …, B_count(x).
 *  Source: DLMF 24.2.5 and 24.5.3, by B_k(x) = Σ binomial(k, j) B_j x^{k − j}. */
export function bernoulliPolynomials(x: number, count: number): number[] {
  const numbers = [1];
  for (let k = 1; k <= count; k += 1) {
    let sum = 0;
    let binomial = 1;
    for (let j = 0; j < k; j += 1) {
      sum += binomial * (numbers[j] as number);
      binomial = (binomial * (k + 1 - j)) / (j + 1);
    }
    numbers.push(-sum / (k + 1));
  }
  return numbers.map((_, k) => {
    let value = 0;
    let binomial = 1;
    for (let j = 0; j <= k; j += 1) {
      value += binomial * (numbers[j] as number) * x ** (k - j);
      binomial = (binomial * (k - j)) / (j + 1);
    }
    return value;
  });
}
