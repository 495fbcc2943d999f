import { type Generator, place } from "./simulation-generator.ts";

const LAYERS = 256;

/**
 * A decreasing density f on [0, ∞) cut into 256 layers of equal area.
 *
 *     widths[i], i = 1 … 256: the layer i lies over [0, widths[i]) between the heights f(widths[i]) and f(widths[i + 1]);
 *     widths[256] = 0; the layer 0 is [0, widths[1]) below f(widths[1]), with the tail; widths[0] = area/f(widths[1])
 */
interface Ziggurat {
  readonly widths: Float64Array;
  /** widths·2^−53: what a place below 2^53 is multiplied with */
  readonly scales: Float64Array;
  readonly heights: Float64Array;
  /** f(x) = exp(−(linear + square x) x): said by numbers, because a function would be called, and its value boxed, at each look. */
  readonly linear: number;
  readonly square: number;
  /** A draw from beyond `from`. */
  tail(generator: Generator, from: number): number;
  /** 2 where the sign is random, 0 where the draw is positive. */
  readonly signs: 0 | 2;
}

/** Source of both right edges and areas: G. Marsaglia, W. W. Tsang, The ziggurat method for generating random variables,
 *  J. Statist. Software 5 (2000) 8; to more digits from area = edge·f(edge) + ∫ f beyond it. */
const NORMAL = ziggurat({
  edge: 3.6541528853610088,
  area: 4.92867323399e-3,
  linear: 0,
  square: 0.5,
  inverse: (y) => Math.sqrt(-2 * Math.log(y)),
  tail: normalTail,
  signs: 2,
});
const EXPONENTIAL = ziggurat({
  edge: 7.69711747013105,
  area: 3.949659822581572e-3,
  linear: 1,
  square: 0,
  inverse: (y) => -Math.log(y),
  tail: exponentialTail,
  signs: 0,
});

/**
 * Fills `draws` with normal ones, mean 0 and variance 1. Each takes two words of 32 random bits: 8 for the layer, one for the
 * sign and 53 for the place, none of them used twice; where these do not decide, more of the generator. The tails are those of the law.
 * Source: Marsaglia and Tsang, as above; J. A. Doornik, An improved ziggurat method to generate normal random samples
 * (2005), for why layer and place must not share bits.
 * @param words twice as many as draws, at least
 */
export function drawNormals(draws: Float64Array, words: Int32Array, generator: Generator): void {
  fill(draws, words, generator, NORMAL);
}

/** Fills `draws` with exponential ones, mean 1, by the same way. */
export function drawExponentials(draws: Float64Array, words: Int32Array, generator: Generator): void {
  fill(draws, words, generator, EXPONENTIAL);
}

/** A look into the table for nearly every draw. */
function fill(draws: Float64Array, words: Int32Array, generator: Generator, law: Ziggurat): void {
  const { widths, scales, signs } = law;
  for (let i = 0; i < draws.length; i += 1) {
    const high = words[2 * i] as number;
    const layer = high & (LAYERS - 1);
    const x = place(high, words[2 * i + 1] as number) * (scales[layer] as number);
    const sign = 1 - ((high >>> 7) & signs);
    draws[i] = sign * x;
    if (x >= (widths[layer + 1] as number)) draws[i] = sign * unlikely(layer, x, generator, law);
  }
}

function ziggurat(law: {
  edge: number;
  area: number;
  linear: number;
  square: number;
  inverse: (y: number) => number;
  tail: Ziggurat["tail"];
  signs: 0 | 2;
}): Ziggurat {
  const { edge, area, linear, square, inverse, tail, signs } = law;
  const density = (x: number): number => Math.exp(-(linear + square * x) * x);
  const widths = new Float64Array(LAYERS + 1);
  widths[0] = area / density(edge);
  widths[1] = edge;
  for (let i = 2; i < LAYERS; i += 1) {
    const below = widths[i - 1] as number;
    widths[i] = inverse(density(below) + area / below);
  }
  const heights = widths.map((x, i) => (i === 0 ? 0 : density(x)));
  return { widths, scales: widths.map((x) => x * 2 ** -53), heights, linear, square, tail, signs };
}

/** One draw in a hundred: beyond the part of its layer that lies wholly below the density. */
function unlikely(layer: number, x: number, generator: Generator, law: Ziggurat): number {
  const { widths, scales, heights, linear, square, tail } = law;
  for (;;) {
    if (layer === 0) return tail(generator, widths[1] as number);
    const bottom = heights[layer] as number;
    const top = heights[layer + 1] as number;
    if (bottom + generator.uniform() * (top - bottom) < Math.exp(-(linear + square * x) * x)) return x;
    const high = generator.next();
    layer = high & (LAYERS - 1);
    x = place(high, generator.next()) * (scales[layer] as number);
    if (x < (widths[layer + 1] as number)) return x;
  }
}

/** Source: G. Marsaglia, Generating a variable from the tail of the normal distribution, Technometrics 6 (1964) 101–102. */
function normalTail(generator: Generator, from: number): number {
  for (;;) {
    const beyond = -Math.log(1 - generator.uniform()) / from;
    if (-2 * Math.log(1 - generator.uniform()) > beyond * beyond) return from + beyond;
  }
}

/** The exponential law has no memory. */
function exponentialTail(generator: Generator, from: number): number {
  return from - Math.log(1 - generator.uniform());
}
