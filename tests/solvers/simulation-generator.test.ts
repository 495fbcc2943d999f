import { describe, expect, test } from "vitest";
import { Generator, seededState } from "../../app/solvers/simulation-generator.ts";
import { drawExponentials, drawNormals } from "../../app/solvers/simulation-variates.ts";

const unsigned = (x: number) => x >>> 0;

describe("the generator is xoshiro128++ 1.0", () => {
  test("its first outputs from the state 1, 2, 3, 4", () => {
    // Source: test vectors of the Rust crate rand_xoshiro, made with the authors' C code; from memory, the third line confirms them.
    const published = [641, 1573767, 3222811527, 3517856514, 836907274, 4247214768, 3867114732, 1355841295, 495546011];
    const generator = new Generator([1, 2, 3, 4]);
    expect(published.map(() => unsigned(generator.next()))).toEqual(published);
  });

  test("its output after 102400 others", () => {
    // Source: php-src, ext/random/tests/02_engine/user_xoshiro128plusplus.phpt: "fa3c872c", lowest byte first.
    const generator = new Generator([1, 2, 3, 4]);
    for (let i = 0; i < 102_400; i += 1) generator.next();
    expect(unsigned(generator.next()).toString(16)).toBe("2c873cfa");
  });

  test("words by the hundred are the words one by one", () => {
    const [one, many] = [new Generator([1, 2, 3, 4]), new Generator([1, 2, 3, 4])];
    const words = new Int32Array(100);
    many.fill(words);
    expect([...words]).toEqual(Array.from({ length: 100 }, () => one.next()));
    expect(many.next()).toBe(one.next());
  });

  test("a seed is spread by splitmix64", () => {
    // Source: the published outputs of splitmix64 from 1234567, 6457827717110365317 and 3203168211198807973.
    const words = [...seededState(1_234_567)].map((word) => BigInt(unsigned(word)));
    const [a = 0n, b = 0n, c = 0n, d = 0n] = words;
    expect([a + (b << 32n), c + (d << 32n)]).toEqual([6457827717110365317n, 3203168211198807973n]);
  });

  test("a jump is 2^64 steps", () => {
    // Computed by an independent method: a step is linear over GF(2); its matrix is squared 64 times.
    let matrix = Array.from({ length: 128 }, (_, bit) => bitsAfterStep(1n << BigInt(bit)));
    for (let i = 0; i < 64; i += 1) matrix = matrix.map((column) => applied(matrix, column));
    for (const seed of [1, 2, 2 ** 53 - 1]) {
      const generator = new Generator(seededState(seed));
      const before = toBits(generator.state);
      generator.jump();
      expect(toBits(generator.state)).toBe(applied(matrix, before));
    }
  });
});

function toBits(state: Int32Array): bigint {
  return [...state].reduce((bits, word, i) => bits + (BigInt(unsigned(word)) << BigInt(32 * i)), 0n);
}

function bitsAfterStep(bits: bigint): bigint {
  const words = [0, 1, 2, 3].map((i) => Number(BigInt.asIntN(32, bits >> BigInt(32 * i))));
  const generator = new Generator(words);
  generator.next();
  return toBits(generator.state);
}

/** A matrix over GF(2), given by its columns, times a vector. */
function applied(columns: readonly bigint[], vector: bigint): bigint {
  return columns.reduce((sum, column, bit) => ((vector >> BigInt(bit)) & 1n ? sum ^ column : sum), 0n);
}

const DRAWS = 2_000_000;

function draws(law: typeof drawNormals, seed: number): Float64Array {
  const generator = new Generator(seededState(seed));
  const words = new Int32Array(2 * DRAWS);
  generator.fill(words);
  const all = new Float64Array(DRAWS);
  law(all, words, generator);
  return all;
}

/** Distance of a share from a probability, in standard errors. */
function deviations(sample: Float64Array, holds: (x: number) => boolean, p: number): number {
  let hits = 0;
  for (const x of sample) if (holds(x)) hits += 1;
  return Math.abs(hits / DRAWS - p) / Math.sqrt((p * (1 - p)) / DRAWS);
}

// Seeds are fixed: what passes goes on passing. With fresh seeds one comparison in 16 000 would be beyond 4 standard errors.
describe.each([1, 2, 3])("draws of seed %i", (seed) => {
  test("normal: moments, and the share below tabulated quantiles, tail included", () => {
    const sample = draws(drawNormals, seed);
    const moment = (k: number) => sample.reduce((sum, x) => sum + x ** k, 0) / DRAWS;
    // E N^{2k} = 1, 3, 15, 105, from memory: (2k − 1)!!
    expect(Math.abs(moment(1)) * Math.sqrt(DRAWS)).toBeLessThan(4);
    expect(Math.abs(moment(2) - 1) * Math.sqrt(DRAWS / 2)).toBeLessThan(4);
    expect(Math.abs(moment(3)) * Math.sqrt(DRAWS / 15)).toBeLessThan(4);
    expect(Math.abs(moment(4) - 3) * Math.sqrt(DRAWS / 96)).toBeLessThan(4);
    // Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions (1964), table 26.1.
    const table: [number, number][] = [
      [0, 0.5],
      [0.5, 0.6914624613],
      [1, 0.8413447461],
      [2, 0.9772498681],
      [3, 0.998650102],
      [3.5, 0.9997673709],
      [4, 0.9999683288],
    ];
    for (const [x, p] of table) {
      expect(deviations(sample, (z) => z <= x, p)).toBeLessThan(4);
      expect(deviations(sample, (z) => z > -x, p)).toBeLessThan(4);
    }
  });

  test("exponential: moments, and the share beyond points of the body and of the tail", () => {
    const sample = draws(drawExponentials, seed);
    const moment = (k: number) => sample.reduce((sum, x) => sum + x ** k, 0) / DRAWS;
    // E E^k = k!
    expect(Math.abs(moment(1) - 1) * Math.sqrt(DRAWS)).toBeLessThan(4);
    expect(Math.abs(moment(2) - 2) * Math.sqrt(DRAWS / 20)).toBeLessThan(4);
    for (const x of [0.01, 0.1, 0.5, 1, 2, 4, 7, 7.7, 9]) {
      expect(deviations(sample, (e) => e > x, Math.exp(-x))).toBeLessThan(4);
    }
    expect(Math.min(...sample.subarray(0, 100_000))).toBeGreaterThanOrEqual(0);
  });

  test("neighbouring draws are uncorrelated, their sizes too", () => {
    const sample = draws(drawNormals, seed);
    let product = 0;
    let squares = 0;
    for (let i = 1; i < DRAWS; i += 1) {
      const [a = 0, b = 0] = [sample[i - 1], sample[i]];
      product += a * b;
      squares += (a * a - 1) * (b * b - 1);
    }
    expect(Math.abs(product) / Math.sqrt(DRAWS)).toBeLessThan(4);
    expect(Math.abs(squares) / Math.sqrt(4 * DRAWS)).toBeLessThan(4);
  });
});
