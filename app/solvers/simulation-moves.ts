import type { Generator } from "./simulation-generator.ts";
import { drawExponentials, drawNormals } from "./simulation-variates.ts";

/** Moves made ahead at a time: few enough that what a stream leaves over costs nothing. */
export const AHEAD = 256;

/**
 * What particles do in their lives, made ahead, wherever they are: whoever follows one takes `shifts[next]` and `limits[next]` and counts on,
 * and asks for more at the end. So the draws stand in a loop without a branch that chance decides.
 *
 * A particle at y lives an exponential time t and is then at z = y + shift, shift = drift t + √(2 D t) N. The path between is a
 * Brownian bridge, which touches 0 with probability exp(−y z/(D t)), 1 where z ≤ 0: it does where y z ≤ limit = D t E, with E
 * exponential of mean 1.
 * Source: the reflection principle; I. Karatzas, S. E. Shreve, Brownian Motion and Stochastic Calculus (1991), section 2.8.
 */
export class Moves {
  readonly generator: Generator;
  readonly shifts = new Float64Array(AHEAD);
  readonly limits = new Float64Array(AHEAD);
  /** The first that was not taken. */
  next = AHEAD;
  readonly #words = new Int32Array(2 * AHEAD);
  readonly #lives = new Float64Array(AHEAD);
  readonly #normals = new Float64Array(AHEAD);
  /** In units of D t: how far a particle drifts, and its mean life. */
  readonly #drift: number;
  readonly #life: number;

  /** @param model drift in length/time, diffusion D in length²/time, rate in 1/time */
  constructor(generator: Generator, model: { drift: number; diffusion: number; rate: number }) {
    this.generator = generator;
    this.#drift = model.drift / model.diffusion;
    this.#life = model.diffusion / model.rate;
  }

  /** Draws all anew. */
  more(): void {
    const { generator, shifts, limits } = this;
    const words = this.#words;
    const lives = this.#lives;
    const normals = this.#normals;
    generator.fill(words);
    drawExponentials(lives, words, generator);
    generator.fill(words);
    drawNormals(normals, words, generator);
    generator.fill(words);
    drawExponentials(limits, words, generator);
    const drift = this.#drift;
    const life = this.#life;
    for (let i = 0; i < AHEAD; i += 1) {
      const unit = life * (lives[i] as number);
      shifts[i] = drift * unit + Math.sqrt(2 * unit) * (normals[i] as number);
      limits[i] = unit * (limits[i] as number);
    }
  }
}
