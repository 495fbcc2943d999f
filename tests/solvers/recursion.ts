/** The law of K by the exact recursion in powers of s, in fixed point with 100 digits: it shares nothing with the solver but the equation.
 *  Source of the method: a(s) = dw/dx on the trajectory obeys D a a′ = −(drift a + f(s)); with F = w(x, s), H = ∂F/∂x,
 *  a F_s = H and D a H_s = −(drift H + f(F)), F(0) = H(0) = 0. Triangular where no particle dies childless. */

const DIGITS = 100n;
const ONE = 10n ** DIGITS;

function fixed(x: number): bigint {
  const exponent = x === 0 ? 0 : Math.floor(Math.log2(Math.abs(x)));
  const whole = BigInt(x * 2 ** (52 - exponent));
  return exponent >= 52 ? whole * ONE * 2n ** BigInt(exponent - 52) : (whole * ONE) / 2n ** BigInt(52 - exponent);
}

const times = (a: bigint, b: bigint) => (a * b) / ONE;
const over = (a: bigint, b: bigint) => (a * ONE) / b;

function root(a: bigint): bigint {
  let x = fixed(Math.sqrt(Number(a / 10n ** 80n) / 1e20));
  for (let k = 0; k < 8; k += 1) x = (x + over(a, x)) / 2n;
  return x;
}

function exponential(x: bigint): bigint {
  let term = ONE;
  let sum = ONE;
  for (let k = 1n; term !== 0n; k += 1n) {
    term = times(term, x) / k;
    sum += term;
  }
  return sum;
}

/** P(K = n) as decimal strings of 60 digits, n = 0, …, upTo, for one particle at `x`; probabilities[0] must be 0.
 *  @param probabilities exact as doubles, as are drift, rate and diffusion */
export function lawByRecursion(
  model: { drift: number; rate: number; diffusion: number; probabilities: readonly number[] },
  x: number,
  upTo: number,
): string[] {
  const [drift, rate, diffusion] = [fixed(model.drift), fixed(model.rate), fixed(model.diffusion)];
  const p = model.probabilities.map(fixed);
  const none = (upTo: number) => Array.from({ length: upTo + 1 }, () => 0n);
  // f(s) = rate (G(s) − s)
  const f = (k: number) => times(rate, (p[k] ?? 0n) - (k === 1 ? ONE : 0n));
  const f1 = f(1);
  const kappa = over(drift + root(times(drift, drift) - 4n * times(diffusion, f1)), 2n * diffusion);
  const a = none(upTo + 1);
  a[1] = -kappa;
  for (let n = 2; n <= upTo; n += 1) {
    let sum = 0n;
    for (let i = 2; i < n; i += 1) sum += (a[i] as bigint) * BigInt(n + 1 - i) * (a[n + 1 - i] as bigint);
    a[n] = over(-(f(n) + times(diffusion, sum / ONE)), drift - times(diffusion, BigInt(n + 1) * kappa));
  }
  const F = none(upTo);
  const H = none(upTo);
  F[1] = exponential(-times(kappa, fixed(x)));
  H[1] = -times(kappa, F[1]);
  // powers[k] = F^k, kept up to date term by term
  const degree = p.length - 1;
  const powers = Array.from({ length: degree + 1 }, () => none(upTo));
  powers[1] = F;
  for (let n = 2; n <= upTo; n += 1) {
    let f2 = 0n;
    for (let k = 2; k <= degree; k += 1) {
      // F^k at n without F_n: F_0 = 0, so that F_n does not enter
      let sum = 0n;
      for (let i = 1; i < n; i += 1) sum += (F[i] as bigint) * ((powers[k - 1] as bigint[])[n - i] as bigint);
      (powers[k] as bigint[])[n] = sum / ONE;
      f2 += times(f(k), (powers[k] as bigint[])[n] as bigint);
    }
    let s1 = 0n;
    let s2 = 0n;
    for (let k = 2; k <= n; k += 1) {
      const weight = BigInt(n - k + 1) * (a[k] as bigint);
      s1 += weight * (F[n - k + 1] as bigint);
      s2 += weight * (H[n - k + 1] as bigint);
    }
    s1 /= ONE;
    s2 = times(diffusion, s2 / ONE);
    // −κ n F − H = −s1,   f′(0) F + (drift − D κ n) H = −s2 − f2
    const c = drift - times(diffusion, BigInt(n) * kappa);
    const m = BigInt(n) * kappa;
    const right = -s2 - f2;
    F[n] = over(times(s1, c) - right, times(m, c) - f1);
    H[n] = s1 - times(m, F[n] as bigint);
  }
  return F.map((value) => `${value}e-${DIGITS}`);
}
