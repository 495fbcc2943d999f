import type { NoRoot } from "./root.ts";
import type { Answer, ScaledEstimate } from "./types.ts";

/** A function whose values carry errors, and which may have none somewhere. */
export type Probe = (x: number) => Answer<ScaledEstimate>;

/** A value of the function. */
export interface Sample {
  readonly x: number;
  readonly value: ScaledEstimate;
  /** the value and its error in a unit common to all samples of one search */
  readonly height: number;
  readonly uncertainty: number;
  /** 0: undecided within the error */
  readonly sign: -1 | 0 | 1;
}

/** Asks for values, each argument once, and counts them. */
export class Prober {
  private readonly f: Probe;
  private readonly known = new Map<number, Answer<Sample>>();
  private unit: number | null = null;

  constructor(f: Probe) {
    this.f = f;
  }

  get evaluations(): number {
    return this.known.size;
  }

  at(x: number): Answer<Sample> {
    const known = this.known.get(x);
    if (known !== undefined) return known;
    const value = this.f(x);
    const isEndless = !("refused" in value || (Number.isFinite(value.mantissa) && Number.isFinite(value.error)));
    const made = "refused" in value ? value : isEndless ? { refused: "Its value is infinite." } : this.sample(x, value);
    this.known.set(x, made);
    return made;
  }

  private sample(x: number, value: ScaledEstimate): Sample {
    const { mantissa, exponent, error } = value;
    if (this.unit === null && mantissa !== 0) this.unit = exponent;
    const factor = 2 ** (exponent - (this.unit ?? 0));
    const sign = Math.abs(mantissa) <= error ? 0 : mantissa > 0 ? 1 : -1;
    return { x, value, height: within(mantissa, factor), uncertainty: within(error, factor), sign };
  }
}

/** A product kept within the range of doubles, and away from 0 unless it is 0. */
function within(mantissa: number, factor: number): number {
  if (mantissa === 0) return 0;
  const size = Math.min(Math.max(Math.abs(mantissa) * factor, Number.MIN_VALUE), Number.MAX_VALUE / 4);
  return mantissa > 0 ? size : -size;
}

export interface Bracket {
  readonly low: Sample;
  readonly high: Sample;
  /** why there are no values in the rest of the interval; null where there is no rest */
  readonly unanswered: string | null;
}

/** Interior points tried, as shares of the interval, where both ends have no value. */
const SEEDS = [
  1 / 2,
  1 / 4,
  3 / 4,
  1 / 8,
  3 / 8,
  5 / 8,
  7 / 8,
  1 / 16,
  3 / 16,
  5 / 16,
  7 / 16,
  9 / 16,
  11 / 16,
  13 / 16,
  15 / 16,
];
/** Halvings of the stretch between a point with a value and one without. */
const HALVINGS = 50;

/**
 * The ends of the interval, or where they have no value the outermost points found that have one; less far out where the
 * sign has changed on the way.
 */
export function bracketWithin(prober: Prober, from: number, to: number): Bracket | NoRoot {
  const ends = [prober.at(from), prober.at(to)] as const;
  const [first, last] = ends;
  if (!("refused" in first || "refused" in last)) return { low: first, high: last, unanswered: null };
  const reason = "refused" in first ? first.refused : "refused" in last ? last.refused : "";
  const seed = seedOf(prober, ends, from, to);
  if (seed === null) return { why: "no values", reason };
  const low = "refused" in first ? outward(prober, seed, from) : first;
  if (low.sign * seed.sign < 0) return { low, high: seed, unanswered: reason };
  const high = "refused" in last ? outward(prober, seed, to) : last;
  return high.sign * seed.sign < 0 ? { low: seed, high, unanswered: reason } : { low, high, unanswered: reason };
}

/** A point with a value: an end, or one between. */
function seedOf(prober: Prober, ends: readonly Answer<Sample>[], from: number, to: number): Sample | null {
  for (const end of ends) if (!("refused" in end)) return end;
  for (const share of SEEDS) {
    const sample = prober.at(from + share * (to - from));
    if (!("refused" in sample)) return sample;
  }
  return null;
}

/** The outermost point with a value between a point that has one and an end that has none, or one where the sign has changed. */
function outward(prober: Prober, seed: Sample, end: number): Sample {
  let answered = seed;
  let refused = end;
  for (let halving = 0; halving < HALVINGS; halving += 1) {
    const middle = (answered.x + refused) / 2;
    if (middle === answered.x || middle === refused) break;
    const sample = prober.at(middle);
    if ("refused" in sample) refused = middle;
    else answered = sample;
    if (answered.sign * seed.sign < 0) break;
  }
  return answered;
}
