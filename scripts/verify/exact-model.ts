import { describeProcess, type Offspring, type ProcessModel } from "../../app/solvers/index.ts";
import type { Fixed } from "./fixed.ts";
import type { FixedLaw } from "./generating.ts";

/** A decimal fraction units·10^−digits, and the double that it becomes. */
export interface Decimal {
  readonly units: bigint;
  readonly digits: number;
  readonly double: number;
}

export type ExactLaw =
  | { readonly law: "finite"; readonly probabilities: readonly Decimal[] }
  | { readonly law: "geometric" | "poisson"; readonly mean: Decimal };

/** A model as it was meant, in decimals; its drift may be meant to be the critical one, away from the barrier or toward it. */
export interface ExactModel {
  readonly drift: Decimal | "critical" | "critical toward";
  readonly rate: Decimal;
  readonly diffusion: Decimal;
  readonly offspring: ExactLaw;
  /** the doubles that the solver is given */
  readonly model: ProcessModel;
}

export function decimal(units: bigint, digits: number): Decimal {
  return { units, digits, double: Number(`${units}e${-digits}`) };
}

/** The decimal with so many significant digits nearest to x. */
export function decimalNear(x: number, significant: number, random: () => number): Decimal {
  if (x === 0) return decimal(0n, 0);
  const digits = significant - 1 - Math.floor(Math.log10(Math.abs(x)));
  // beyond 15 digits a double has no more to give: the rest is drawn
  const own = Math.min(significant, 15);
  const lead = BigInt(Math.round(Math.abs(x) * 10 ** (own - 1 - Math.floor(Math.log10(Math.abs(x))))));
  const rest = significant - own;
  const drawn = rest > 0 ? BigInt(Math.floor(random() * 10 ** rest)) : 0n;
  const units = lead * 10n ** BigInt(rest) + drawn;
  return decimal(x < 0 ? -units : units, digits);
}

export function toFixed(f: Fixed, d: Decimal): bigint {
  return d.digits >= 0 ? f.ratio(d.units, 10n ** BigInt(d.digits)) : f.ratio(d.units * 10n ** BigInt(-d.digits), 1n);
}

/** The law in fixed point. */
export function fixedLaw(f: Fixed, law: ExactLaw): FixedLaw {
  if (law.law === "finite") return { law: "finite", probabilities: law.probabilities.map((p) => toFixed(f, p)) };
  return { law: law.law, mean: toFixed(f, law.mean) };
}

/** G'(1) − 1, to the last bit of the fixed point. */
export function excessOf(f: Fixed, law: FixedLaw): bigint {
  if (law.law === "finite") return law.probabilities.reduce((sum, p, k) => sum + BigInt(k - 1) * p, 0n);
  return law.mean - f.one;
}

/** Which kind of drift a model is drawn with; the law decides what is possible. */
export const KINDS = [
  "away",
  "critical",
  "near critical",
  "fast",
  "between",
  "toward",
  "subcritical",
  "mean one",
] as const;
export type Kind = (typeof KINDS)[number];

/** Significant digits of the inputs: as papers have them, and beyond what a double holds. */
const DIGITS = [2, 3, 5, 17, 20];

/** A random model of a kind. Rates and diffusion span two orders of magnitude. */
export function randomModel(kind: Kind, random: () => number): ExactModel {
  const logarithmic = (from: number, to: number) => from * (to / from) ** random();
  const digits = DIGITS[Math.floor(random() * DIGITS.length)] as number;
  const draw = (x: number, least = 1) => decimalNear(x, Math.max(digits, least), random);
  const rate = draw(logarithmic(0.1, 10));
  const diffusion = random() < 0.3 ? decimal(5n, 1) : draw(logarithmic(0.1, 10));
  const offspring = randomLaw(kind, digits, random, draw);
  const base = { rate: rate.double, diffusion: diffusion.double, offspring: lawOf(offspring) };
  const description = describeProcess({ ...base, drift: 1 });
  const critical = "refused" in description.criticalDrift ? 0 : description.criticalDrift.value;
  const scale = Math.sqrt(rate.double * diffusion.double);
  const drift = randomDrift(kind, critical, scale, random, draw);
  const size = typeof drift === "string" ? (drift === "critical" ? critical : -critical) : drift.double;
  return { drift, rate, diffusion, offspring, model: { ...base, drift: size } };
}

type Draw = (x: number, least?: number) => Decimal;

function randomDrift(
  kind: Kind,
  critical: number,
  scale: number,
  random: () => number,
  draw: Draw,
): ExactModel["drift"] {
  const logarithmic = (from: number, to: number) => from * (to / from) ** random();
  switch (kind) {
    case "away":
      return draw(critical * (1 + logarithmic(1e-2, 3)), 3);
    case "critical":
      return "critical";
    case "near critical":
      return draw(critical * (1 + logarithmic(1e-9, 1e-2)), 12);
    case "fast":
      return draw(critical * logarithmic(4, 100));
    case "between":
      return draw(critical * (0.97 - 1.87 * random()), 3);
    case "toward":
      return random() < 0.1 ? "critical toward" : draw(-critical * (1 + logarithmic(1e-2, 2)), 3);
    case "subcritical":
      return draw(scale * (3 * random() - 1));
    case "mean one":
      return draw(scale * logarithmic(0.05, 3));
  }
}

function randomLaw(kind: Kind, digits: number, random: () => number, draw: Draw): ExactLaw {
  const logarithmic = (from: number, to: number) => from * (to / from) ** random();
  const choice = random();
  if (kind === "mean one") {
    if (choice < 0.4) return { law: "finite", probabilities: [5n, 0n, 5n].map((p) => decimal(p, 1)) };
    return { law: choice < 0.7 ? "geometric" : "poisson", mean: decimal(1n, 0) };
  }
  const mean = kind === "subcritical" ? 0.2 + 0.75 * random() : 1.02 + logarithmic(0.1, 5);
  if (choice < 0.25) return { law: "geometric", mean: draw(mean, 3) };
  if (choice < 0.5) return { law: "poisson", mean: draw(mean, 3) };
  if (choice < 0.7 && kind !== "subcritical")
    return { law: "finite", probabilities: [0n, 0n, 1n].map((p) => decimal(p, 0)) };
  return randomFinite(kind === "subcritical", Math.min(digits, 17), random);
}

/** Integers that sum to a power of ten, with a mean on the wanted side of 1. */
function randomFinite(subcritical: boolean, digits: number, random: () => number): ExactLaw {
  const whole = 10n ** BigInt(digits);
  for (;;) {
    const weights = Array.from({ length: 3 + Math.floor(4 * random()) }, () => (random() < 0.3 ? 0 : random()));
    weights[weights.length - 1] = 0.05 + random();
    if (subcritical) weights[0] = (weights[0] as number) + 2;
    else if (random() < 0.4) weights[0] = 0;
    const total = weights.reduce((sum, w) => sum + w, 0);
    const units = weights.map((w) => BigInt(Math.floor((w / total) * Number(whole))));
    units[units.length - 1] = whole - units.slice(0, -1).reduce((sum, u) => sum + u, 0n);
    const excess = units.reduce((sum, u, k) => sum + BigInt(k - 1) * u, 0n);
    const share = Number(excess) / Number(whole);
    if (subcritical ? share < -0.05 && (units.at(-1) as bigint) > 0n : share > 0.05)
      return { law: "finite", probabilities: units.map((u) => decimal(u, digits)) };
  }
}

function lawOf(law: ExactLaw): Offspring {
  return law.law === "finite"
    ? { law: "finite", probabilities: law.probabilities.map((p) => p.double) }
    : { law: law.law, mean: law.mean.double };
}
