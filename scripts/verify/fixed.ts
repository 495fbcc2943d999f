/** Fixed-point arithmetic on big integers: a number x is the integer x·2^bits. Sums are exact, products and quotients lose less than
 *  one unit of 2^−bits. */
export class Fixed {
  readonly bits: number;
  readonly one: bigint;
  readonly ln2: bigint;
  readonly pi: bigint;
  private readonly shift: bigint;

  constructor(bits: number) {
    this.bits = bits;
    this.shift = BigInt(bits);
    this.one = 1n << this.shift;
    // Source: ln 2 = 18 artanh(1/26) − 2 artanh(1/4801) + 8 artanh(1/8749); π/4 = 4 arctan(1/5) − arctan(1/239) (J. Machin, 1706).
    this.ln2 = 18n * this.inverse(26n, 1n) - 2n * this.inverse(4801n, 1n) + 8n * this.inverse(8749n, 1n);
    this.pi = 4n * (4n * this.inverse(5n, -1n) - this.inverse(239n, -1n));
  }

  /** artanh(1/d) for sign 1, arctan(1/d) for sign −1. */
  private inverse(d: bigint, sign: bigint): bigint {
    let power = this.one / d;
    let sum = power;
    for (let k = 3n; power !== 0n; k += 2n) {
      power = (sign * power) / (d * d);
      sum += power / k;
    }
    return sum;
  }

  integer(n: number): bigint {
    return BigInt(n) << this.shift;
  }

  ratio(n: bigint, d: bigint): bigint {
    return (n << this.shift) / d;
  }

  /** A double, exactly where it has no digits below 2^−bits. */
  double(x: number): bigint {
    return toInteger(x, 0, this.bits);
  }

  multiply(a: bigint, b: bigint): bigint {
    return (a * b) >> this.shift;
  }

  divide(a: bigint, b: bigint): bigint {
    return (a << this.shift) / b;
  }

  /** A sum of products, not yet shifted back. */
  settle(sum: bigint): bigint {
    return sum >> this.shift;
  }

  /** √a, a ≥ 0: Newton's method on integers. */
  squareRoot(a: bigint): bigint {
    if (a <= 0n) return 0n;
    const n = a << this.shift;
    let root = 1n << BigInt((n.toString(16).length * 4) / 2 + 1);
    for (;;) {
      const next = (root + n / root) >> 1n;
      if (next >= root) return root;
      root = next;
    }
  }

  /** e^a. */
  exponential(a: bigint): bigint {
    const power = a / this.ln2;
    const halvings = BigInt(Math.ceil(Math.sqrt(this.bits)));
    const extra = halvings + 16n;
    const wide = this.shift + extra;
    const r = ((a - power * this.ln2) << extra) >> halvings;
    let term = r;
    let sum = r;
    for (let k = 2n; term !== 0n; k += 1n) {
      term = ((term * r) >> wide) / k;
      sum += term;
    }
    // e^r − 1 doubled by (1 + y)² − 1
    for (let k = 0n; k < halvings; k += 1n) sum = 2n * sum + ((sum * sum) >> wide);
    const value = (sum >> extra) + this.one;
    return power >= 0n ? value << power : value >> -power;
  }

  /** ln a, a > 0: Newton's method on the exponential, of third order. */
  logarithm(a: bigint): bigint {
    const length = a.toString(2).length - this.bits;
    const reduced = length >= 0 ? a >> BigInt(length) : a << BigInt(-length);
    let y = this.double(Math.log(this.toNumber(reduced)));
    for (let digits = 48; digits < 3 * this.bits; digits *= 3) {
      const e = this.exponential(y);
      y += this.divide(2n * (reduced - e), reduced + e);
    }
    return y + BigInt(length) * this.ln2;
  }

  power(a: bigint, exponent: number): bigint {
    let result = this.one;
    let square = a;
    for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
      if (rest % 2 === 1) result = this.multiply(result, square);
      square = this.multiply(square, square);
    }
    return result;
  }

  toNumber(a: bigint): number {
    return toDouble({ units: a, exponent: -this.bits });
  }
}

/** units·2^exponent. */
export interface Real {
  readonly units: bigint;
  readonly exponent: number;
}

/** Leading bits kept on the way to a double. */
const KEPT = 70;

/** The nearest double, or a neighbour of it. */
export function toDouble({ units, exponent }: Real): number {
  const excess = Math.max(0, lengthOf(units) - KEPT);
  return Number(units >> BigInt(excess)) * 2 ** (exponent + excess);
}

/** Number of bits, to within three. */
export function lengthOf(a: bigint): number {
  return (a < 0n ? -a : a).toString(16).length * 4;
}

/** log2 |a·2^exponent|; −∞ for 0. */
export function log2Of({ units, exponent }: Real): number {
  if (units === 0n) return Number.NEGATIVE_INFINITY;
  const excess = Math.max(0, lengthOf(units) - KEPT);
  return Math.log2(Math.abs(Number(units >> BigInt(excess)))) + exponent + excess;
}

/** x·2^(exponent + bits) as an integer, digits below it dropped. */
export function toInteger(x: number, exponent: number, bits: number): bigint {
  if (x === 0) return 0n;
  const own = Math.max(-1074, Math.floor(Math.log2(Math.abs(x))) - 54);
  // |x| may be below the normal range: two steps keep every digit
  const half = Math.trunc(own / 2);
  const units = BigInt(x * 2 ** -half * 2 ** (half - own));
  const up = own + exponent + bits;
  return up >= 0 ? units << BigInt(up) : units >> BigInt(-up);
}
