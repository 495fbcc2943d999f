import { SolverError } from "./errors.ts";
import { AHEAD, type Moves } from "./simulation-moves.ts";
import { type ChildrenTable, childrenTable } from "./simulation-offspring.ts";
import type { Offspring, Start } from "./types.ts";

/** Where a tree is not followed further. */
export interface TreeEnds {
  /** Particles that branch above this are dropped; null: none is. */
  readonly cut: number | null;
  /** A replicate ends when so many are absorbed; null: it goes on. */
  readonly cap: number | null;
  /** Particle steps of all trees together. */
  readonly mostSteps: number;
  /** Follow the lowest particle first: where infinitely many may be absorbed, so that a replicate comes to its cap. */
  readonly lowestFirst: boolean;
}

const FIRST_ROOM = 1024;
/** Particles alive at once: 80 MB of positions. */
const MOST_ALIVE = 10_000_000;

/**
 * Grows one tree after another and counts what is absorbed. Each particle goes on by draws of its own, so that the order in
 * which those alive are followed does not change the law of K; and as they decide whether the path of a whole life touches the
 * barrier, K has its law exactly, without any step of time.
 * Source: as simulation-moves.ts.
 */
export class Trees {
  /** Particles followed so far. */
  steps = 0;
  readonly #moves: Moves;
  readonly #children: ChildrenTable;
  readonly #ends: TreeEnds;
  /** Positions of the particles alive: a stack, or a heap with the lowest at 0. */
  #alive = new Float64Array(FIRST_ROOM);

  /** @throws SolverError "bad_parameter" for an offspring law that cannot be drawn from */
  constructor(offspring: Offspring, moves: Moves, ends: TreeEnds) {
    this.#moves = moves;
    this.#children = childrenTable(offspring);
    this.#ends = ends;
  }

  /** K of one replicate; the cap where it comes to that.
   *  @throws SolverError "not_converged" when the trees are too large to be followed */
  grow(starts: readonly Start[]): number {
    const cap = this.#ends.cap ?? Number.POSITIVE_INFINITY;
    let absorbed = 0;
    for (const { position, particles } of starts) {
      for (let i = 0; i < particles && absorbed < cap; i += 1)
        absorbed += position === 0 ? 1 : this.#absorbed(position, cap - absorbed);
    }
    return absorbed;
  }

  /** How many of one particle's tree are absorbed, `most` at most. Everything the loop touches is a local: it is what simulations spend their time in. */
  #absorbed(start: number, most: number): number {
    const moves = this.#moves;
    const { shifts, limits, generator } = moves;
    const { below, certain } = this.#children;
    const { lowestFirst } = this.#ends;
    const cut = this.#ends.cut ?? Number.POSITIVE_INFINITY;
    let next = moves.next;
    let alive = this.#alive;
    let size = 0;
    let absorbed = 0;
    let steps = 0;
    let y = start;
    for (;;) {
      if (next === AHEAD) {
        moves.more();
        next = 0;
        this.#count(steps);
        steps = 0;
      }
      steps += 1;
      const z = y + (shifts[next] as number);
      if (y * z <= (limits[next++] as number)) {
        absorbed += 1;
        if (absorbed >= most) break;
      } else if (z <= cut) {
        let children = certain;
        if (children < 0) {
          const u = generator.uniform();
          children = 0;
          while (u >= (below[children] as number)) children += 1;
        }
        if (size + children > alive.length) alive = this.#moreRoom(size + children);
        if (lowestFirst) for (let i = 0; i < children; i += 1) rise(alive, size++, z);
        else if (children > 0) {
          // One of them is followed at once.
          for (let i = 1; i < children; i += 1) alive[size++] = z;
          y = z;
          continue;
        }
      }
      if (size === 0) break;
      if (lowestFirst) {
        y = alive[0] as number;
        size -= 1;
        sink(alive, size, alive[size] as number);
      } else {
        size -= 1;
        y = alive[size] as number;
      }
    }
    moves.next = next;
    this.#count(steps);
    return absorbed;
  }

  #count(steps: number): void {
    this.steps += steps;
    if (this.steps > this.#ends.mostSteps)
      throw new SolverError(
        "not_converged",
        `The simulation was stopped after ${this.steps.toExponential(1)} particle steps: its trees are larger than was to be expected. Fewer replicates, a lower \`cut\` or a smaller \`cap\` would do.`,
      );
  }

  #moreRoom(needed: number): Float64Array<ArrayBuffer> {
    if (needed > MOST_ALIVE)
      throw new SolverError(
        "not_converged",
        `A tree of the simulation has more than ${MOST_ALIVE} particles alive at once, the most that are followed. A lower \`cut\` or a smaller \`cap\` would do.`,
      );
    const larger = new Float64Array(Math.max(2 * this.#alive.length, needed));
    larger.set(this.#alive);
    this.#alive = larger;
    return larger;
  }
}

/** Puts z into a heap of `size` positions. */
function rise(heap: Float64Array, size: number, z: number): void {
  let at = size;
  while (at > 0) {
    const parent = (at - 1) >> 1;
    const above = heap[parent] as number;
    if (above <= z) break;
    heap[at] = above;
    at = parent;
  }
  heap[at] = z;
}

/** Puts z in place of the lowest in a heap of `size` positions. */
function sink(heap: Float64Array, size: number, z: number): void {
  let at = 0;
  for (;;) {
    let child = 2 * at + 1;
    if (child >= size) break;
    if (child + 1 < size && (heap[child + 1] as number) < (heap[child] as number)) child += 1;
    const below = heap[child] as number;
    if (below >= z) break;
    heap[at] = below;
    at = child;
  }
  heap[at] = z;
}
