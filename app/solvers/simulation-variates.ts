import { fraction, type Generator } from "./simulation-generator.ts";

const LAYERS = 256;
/** Draws made ahead at a time: few enough that what a stream leaves over costs nothing. */
export const AHEAD = 256;

/**
 * A decreasing density f on [0, ∞) cut into 256 layers of equal area.
 *
 *     widths[i], i = 1 … 256: the layer i lies over [0, widths[i]) between the heights f(widths[i]) and f(widths[i + 1]);
 *     widths[256] = 0; the layer 0 is [0, widths[1]) below f(widths[1]), with the tail; widths[0] = area/f(widths[1])
 */
interface Ziggurat {
  readonly widths: Float64Array;
  readonly heights: Float64Array;
  density(x: number): number;
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
  density: (x) => Math.exp((-x * x) / 2),
  inverse: (y) => Math.sqrt(-2 * Math.log(y)),
  tail: normalTail,
  signs: 2,
});
const EXPONENTIAL = ziggurat({
  edge: 7.69711747013105,
  area: 3.949659822581572e-3,
  density: (x) => Math.exp(-x),
  inverse: (y) => -Math.log(y),
  tail: exponentialTail,
  signs: 0,
});

/**
 * Normal and exponential draws of one stream, made ahead: whoever draws takes `normals[normal]` and counts on, and asks for
 * more at the end. Each draw takes 64 bits, 8 for the layer, one for the sign and 53 for the place, none of them used twice,
 * and the tails are those of the laws.
 * Source: Marsaglia and Tsang, as above; J. A. Doornik, An improved ziggurat method to generate normal random samples
 * (2005), for why layer and place must not share bits.
 */
export class Variates {
  readonly generator: Generator;
  /** Mean 0, variance 1. */
  readonly normals = new Float64Array(AHEAD);
  /** Mean 1. */
  readonly exponentials = new Float64Array(AHEAD);
  /** How many of each were taken. */
  normal = AHEAD;
  exponential = AHEAD;

  constructor(generator: Generator) {
    this.generator = generator;
  }

  drawNormals(): void {
    fill(this.normals, 0, this.generator, NORMAL);
  }

  /** @param taken how many of the last ones were taken: the others come first again */
  drawExponentials(taken: number): void {
    this.exponentials.copyWithin(0, taken);
    fill(this.exponentials, AHEAD - taken, this.generator, EXPONENTIAL);
  }
}

function ziggurat(law: {
  edge: number;
  area: number;
  density: (x: number) => number;
  inverse: (y: number) => number;
  tail: Ziggurat["tail"];
  signs: 0 | 2;
}): Ziggurat {
  const { edge, area, density, inverse, tail, signs } = law;
  const widths = new Float64Array(LAYERS + 1);
  widths[0] = area / density(edge);
  widths[1] = edge;
  for (let i = 2; i < LAYERS; i += 1) {
    const below = widths[i - 1] as number;
    widths[i] = inverse(density(below) + area / below);
  }
  const heights = widths.map((x, i) => (i === 0 ? 0 : density(x)));
  return { widths, heights, density, tail, signs };
}

/** Two steps of the generator and a look into the table for nearly every draw: the loop in which simulations spend their time. */
function fill(draws: Float64Array, from: number, generator: Generator, law: Ziggurat): void {
  const { widths, signs } = law;
  const state = generator.state;
  let s0 = state[0] as number;
  let s1 = state[1] as number;
  let s2 = state[2] as number;
  let s3 = state[3] as number;
  for (let j = from; j < draws.length; j += 1) {
    let sum = (s0 + s3) | 0;
    const high = (((sum << 7) | (sum >>> 25)) + s0) | 0;
    let shifted = s1 << 9;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= shifted;
    s3 = (s3 << 11) | (s3 >>> 21);
    sum = (s0 + s3) | 0;
    const low = (((sum << 7) | (sum >>> 25)) + s0) | 0;
    shifted = s1 << 9;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= shifted;
    s3 = (s3 << 11) | (s3 >>> 21);

    const layer = high & (LAYERS - 1);
    const x = fraction(high, low) * (widths[layer] as number);
    const sign = 1 - ((high >>> 7) & signs);
    // Written in either branch: a number that might come of the call would be boxed at each draw.
    if (x < (widths[layer + 1] as number)) draws[j] = sign * x;
    else {
      state[0] = s0;
      state[1] = s1;
      state[2] = s2;
      state[3] = s3;
      draws[j] = sign * unlikely(layer, x, generator, law);
      s0 = state[0] as number;
      s1 = state[1] as number;
      s2 = state[2] as number;
      s3 = state[3] as number;
    }
  }
  state[0] = s0;
  state[1] = s1;
  state[2] = s2;
  state[3] = s3;
}

/** One draw in a hundred: beyond the part of its layer that lies wholly below the density. */
function unlikely(layer: number, x: number, generator: Generator, law: Ziggurat): number {
  const { widths, heights, density, tail } = law;
  for (;;) {
    if (layer === 0) return tail(generator, widths[1] as number);
    const bottom = heights[layer] as number;
    const top = heights[layer + 1] as number;
    if (bottom + generator.uniform() * (top - bottom) < density(x)) return x;
    const high = generator.next();
    layer = high & (LAYERS - 1);
    x = fraction(high, generator.next()) * (widths[layer] as number);
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
