import { absolute, add, multiply, subtract } from "./arithmetic.ts";
import { ROUNDOFF } from "./doubles.ts";
import { approximate, exact, log10Of, roundedUp } from "./quantity.ts";
import type { Quantity, Value } from "./types.ts";
import { at, type Body, notANumber, number, refuse } from "./values.ts";

/** Nodes of the 15-point Kronrod rule on [-1, 1], from 1 to 0. Source: Piessens et al., QUADPACK (1983), qk15. */
const NODES = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.20778495500789848, 0,
];
const KRONROD = [
  0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679,
  0.19035057806478542, 0.20443294007529889, 0.20948214108472782,
];
/** Weights of the 7-point Gauss rule at every second node. */
const GAUSS = [0, 0.1294849661688697, 0, 0.27970539148927664, 0, 0.3818300505051189, 0, 0.4179591836734694];

const FIRST_PANELS = 8;
const MOST_PANELS = 400;
/** Panels are halved until the estimated error is below this part of the integral of |F|. */
const TOLERANCE = 1e-13;
/** Where that cannot be reached, the integral is still given, with its error, up to this part; then it is refused. */
const WORST = 1e-8;

/** Misses within this many powers of ten of the largest count as near it. */
const NEAR_LARGEST = 0.5;

interface Panel {
  readonly from: number;
  readonly to: number;
  readonly integral: Quantity;
  readonly size: Quantity;
  /** |Kronrod - Gauss|: far above the true error where F is smooth. */
  readonly miss: Quantity;
  /** log10 of the miss. */
  readonly rank: number;
}

/** What was learnt of F beyond its integral, and where F gave no number. */
class NoNumber extends Error {
  readonly value: Value;
  constructor(value: Value) {
    super("no number");
    this.value = value;
  }
}

/**
 * Integral of the body from a to b by adaptive Gauss-Kronrod quadrature. Error: the sum of |Kronrod - Gauss| over the
 * panels, the errors of the values of F, the roundings of the nodes, and the errors of a and b times |F| there.
 * Source: Piessens, de Doncker-Kapenga, Überhuber, Kahaner, QUADPACK (1983).
 */
export function integrate(body: Body, args: readonly Quantity[], variable: string): Value {
  const [a, b] = args as readonly [Quantity, Quantity];
  if (a.exponent !== 0 || b.exponent !== 0) return refuse("integral takes bounds between 1e-300 and 1e300 in size");
  const value = (x: number): Quantity => {
    const result = body(exact(x));
    if (result.type !== "number") throw new NoNumber(at(notANumber(result, "integral"), variable, exact(x)));
    return result.quantity;
  };
  if (a.mantissa === b.mantissa && a.error === 0 && b.error === 0) return number(exact(0));
  try {
    const panels = refine(value, a.mantissa, b.mantissa);
    const total = panels.reduce((sum, panel) => add(sum, panel.integral), exact(0));
    const miss = panels.reduce((sum, panel) => add(sum, panel.miss), exact(0));
    if (!isWithin(panels, WORST))
      return refuse(`the integral over ${variable} does not settle; its integrand may be unbounded or too rough`);
    const ends = add(edge(value, a), edge(value, b));
    const widening = add(miss, ends);
    const bound = roundedUp(widening.mantissa + widening.error);
    return number(add(total, { mantissa: 0, exponent: widening.exponent, error: bound, se: 0 }));
  } catch (error) {
    if (error instanceof NoNumber) return error.value;
    throw error;
  }
}

/** What the error of a bound of the integral brings. */
function edge(value: (x: number) => Quantity, bound: Quantity): Quantity {
  return bound.error === 0 ? exact(0) : multiply(absolute(value(bound.mantissa)), exact(bound.error));
}

function refine(value: (x: number) => Quantity, from: number, to: number): Panel[] {
  const panels: Panel[] = [];
  for (let i = 0; i < FIRST_PANELS; i++) {
    const left = i === 0 ? from : from + ((to - from) * i) / FIRST_PANELS;
    const right = i === FIRST_PANELS - 1 ? to : from + ((to - from) * (i + 1)) / FIRST_PANELS;
    panels.push(panelOn(value, left, right));
  }
  while (panels.length < MOST_PANELS && !isWithin(panels, TOLERANCE)) {
    // One round halves the panels whose misses are near the largest: one at a singularity, all where F oscillates.
    panels.sort((p, q) => q.rank - p.rank);
    const threshold = (panels[0] as Panel).rank - NEAR_LARGEST;
    const worst = panels.splice(0, panels.filter(({ rank }) => rank >= threshold).length);
    if (worst.some(isTooNarrow)) return [...panels, ...worst];
    for (const { from: left, to: right } of worst) {
      const middle = (left + right) / 2;
      panels.push(panelOn(value, left, middle), panelOn(value, middle, right));
    }
  }
  return panels;
}

function isTooNarrow({ from, to }: Panel): boolean {
  return Math.abs(to - from) <= 64 * ROUNDOFF * Math.max(Math.abs(from), Math.abs(to));
}

/** Whether the panels' misses together are below that part of the integral of |F|, or below what the errors of F bring. */
function isWithin(panels: readonly Panel[], part: number): boolean {
  let miss = exact(0);
  let size = exact(0);
  let noise = exact(0);
  for (const panel of panels) {
    miss = add(miss, panel.miss);
    size = add(size, panel.size);
    noise = add(noise, { mantissa: panel.integral.error, exponent: panel.integral.exponent, error: 0, se: 0 });
  }
  return miss.mantissa === 0 || log10Of(miss) <= Math.max(log10Of(size) + Math.log10(part), log10Of(noise));
}

function panelOn(value: (x: number) => Quantity, from: number, to: number): Panel {
  const centre = (from + to) / 2;
  const half = (to - from) / 2;
  let kronrod: Quantity = exact(0);
  let gauss: Quantity = exact(0);
  let size: Quantity = exact(0);
  let variation: Quantity = exact(0);
  let before: Quantity | null = null;
  const last = NODES.length - 1;
  for (let i = -last; i <= last; i++) {
    const index = last - Math.abs(i);
    const here = value(centre + Math.sign(i) * half * (NODES[index] ?? 0));
    const weight = (KRONROD[index] ?? 0) * half;
    const weighted = multiply(here, approximate(weight, Math.abs(weight) * 2 * ROUNDOFF));
    kronrod = add(kronrod, weighted);
    size = add(size, absolute(weighted));
    gauss = add(gauss, multiply(here, exact((GAUSS[index] ?? 0) * half)));
    if (before) variation = add(variation, absolute(subtract(here, before)));
    before = here;
  }
  const miss = absolute(subtract(kronrod, gauss));
  // The nodes are rounded: each value may be one at a place beside, over which F varies as it does between nodes.
  const nodes = multiply(variation, exact(2 * ROUNDOFF * Math.max(Math.abs(from), Math.abs(to))));
  const widened = add(kronrod, { mantissa: 0, exponent: nodes.exponent, error: Math.abs(nodes.mantissa), se: 0 });
  return { from, to, integral: widened, size: exactly(size), miss: exactly(miss), rank: log10Of(miss) };
}

function exactly(q: Quantity): Quantity {
  return { mantissa: q.mantissa, exponent: q.exponent, error: 0, se: 0 };
}
