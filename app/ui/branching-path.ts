/**
 * One realization of a branching Brownian motion with drift, killed at the barrier 0: the picture of the first page.
 * Exact at the times of its grid; between them a path that the barrier may have met is killed with the probability of
 * the Brownian bridge. Source: the law of the minimum of a Brownian bridge, P(min <= 0) = exp(-2 a b / (2 D dt)) with
 * ends a, b > 0 and variance 2 D dt; Borodin & Salminen, Handbook of Brownian Motion, 2nd ed., 2002, IV.26.
 */
export interface BranchingModel {
  /** Where the one particle starts, > 0 [length]. */
  readonly start: number;
  /** Away from the barrier [length/time]. */
  readonly drift: number;
  /** Of branching in two [1/time]. */
  readonly rate: number;
  /** D, so that the variance grows as 2 D t [length²/time]. */
  readonly diffusion: number;
  readonly until: number;
  /** Spacing of the grid of times. */
  readonly step: number;
}

export interface Lineage {
  readonly parent: number | null;
  /** Positions at `begins`, then on the grid, then at `ends`. */
  readonly times: readonly number[];
  readonly positions: readonly number[];
  /** Ends at the barrier, rather than by branching or at the end of time. */
  readonly absorbed: boolean;
}

/** Simulates all lineages, parents before their children; `seed` makes it the same each time. */
export function simulateBranching(model: BranchingModel, seed: number): readonly Lineage[] {
  const random = randomNumbers(seed);
  const lineages: Lineage[] = [];
  const open: { parent: number | null; time: number; position: number }[] = [
    { parent: null, time: 0, position: model.start },
  ];
  for (let next = open.shift(); next !== undefined; next = open.shift()) {
    const lineage = follow(model, random, next);
    const index = lineages.push(lineage) - 1;
    const time = lineage.times.at(-1) ?? 0;
    const position = lineage.positions.at(-1) ?? 0;
    if (!lineage.absorbed && time < model.until) {
      open.push({ parent: index, time, position }, { parent: index, time, position });
    }
  }
  return lineages;
}

/** The lineages through which a particle that was absorbed came, itself with them. */
export function ancestryOfAbsorbed(lineages: readonly Lineage[]): ReadonlySet<number> {
  const lines = new Set<number>();
  lineages.forEach((lineage, index) => {
    if (!lineage.absorbed) return;
    for (let at: number | null = index; at !== null; at = lineages[at]?.parent ?? null) lines.add(at);
  });
  return lines;
}

function follow(
  model: BranchingModel,
  random: RandomNumbers,
  from: { parent: number | null; time: number; position: number },
): Lineage {
  const { drift, diffusion, step } = model;
  const ends = Math.min(model.until, from.time - Math.log(random.uniform()) / model.rate);
  const times = [from.time];
  const positions = [from.position];
  let time = from.time;
  let position = from.position;
  while (time < ends) {
    const next = Math.min(ends, (Math.floor(time / step + 1e-9) + 1) * step);
    const variance = 2 * diffusion * (next - time);
    const moved = position + drift * (next - time) + Math.sqrt(variance) * random.normal();
    const met = moved <= 0 || random.uniform() < Math.exp((-2 * position * moved) / variance);
    if (met) {
      // Drawn where the chord meets the barrier, or half-way when only the bridge does.
      const share = moved <= 0 ? position / (position - moved) : 1 / 2;
      times.push(time + share * (next - time));
      positions.push(0);
      return { parent: from.parent, times, positions, absorbed: true };
    }
    times.push(next);
    positions.push(moved);
    time = next;
    position = moved;
  }
  return { parent: from.parent, times, positions, absorbed: false };
}

interface RandomNumbers {
  /** In (0, 1). */
  uniform(): number;
  /** Standard normal. */
  normal(): number;
}

/**
 * Marsaglia's 32-bit xorshift, enough for a picture.
 * Source: G. Marsaglia, Xorshift RNGs, J. Stat. Softw. 8(14), 2003, shifts (13, 17, 5); normals by Box and Muller, 1958.
 */
function randomNumbers(seed: number): RandomNumbers {
  let state = (seed * 2_654_435_761) >>> 0 || 1;
  const uniform = () => {
    state ^= state << 13;
    state >>>= 0;
    state ^= state >>> 17;
    state ^= state << 5;
    state >>>= 0;
    return state / 2 ** 32;
  };
  for (let i = 0; i < 16; i += 1) uniform();
  return {
    uniform,
    normal: () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform()),
  };
}
