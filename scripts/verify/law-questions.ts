import {
  type Answer,
  absorbedAbove,
  absorbedLaw,
  absorbedMoments,
  absorbedProbability,
  factorialMoment,
  type ScaledEstimate,
  type Starts,
  type Trajectory,
  tailLaw,
  tailProbability,
} from "../../app/solvers/index.ts";
import type { Real } from "./fixed.ts";
import { at } from "./generating.ts";
import { asScaled } from "./judge.ts";
import { type Asked, type Question, scaledAnswer } from "./question.ts";
import type { ExactStarts, ReferenceAnswers } from "./reference-answers.ts";
import { exactFrom, singularProbability } from "./singular.ts";

/** n of the far tail, where the expansion at s0 is exact. */
const FAR_OUT = [1000, 10_000, 100_000];
const HIGHEST_MOMENT = 5;

/** The law of K from some starts, or the limit law: probabilities, moments, tail.
 *  @param last largest n that the reference computes term by term */
export function aboutLaw({ t, reference, random }: Asked, exactStarts: ExactStarts, last: number): Question[] {
  const starts: Starts =
    exactStarts === "far"
      ? "far"
      : exactStarts.map(({ position, particles }) => ({ position: position.double, particles }));
  const where = starts === "far" ? "far" : starts.map((s) => `${s.particles} at ${s.position}`).join(", ");
  const name = (subject: string) => (starts === "far" ? `limit law: ${subject}` : subject);
  const real = (units: bigint) => reference.real(units);
  const law = once(() => reference.law(exactStarts, last));
  const moments = once(() => reference.momentSeries(exactStarts, HIGHEST_MOMENT));
  const expansion = once(() => reference.singular(exactStarts));
  const questions: Question[] = [];
  const ask = (subject: string, detail: string, ours: () => Answer<ScaledEstimate>, truth: () => Real | null) =>
    questions.push({ subject: name(subject), detail: `${where}; ${detail}`, ours, truth });

  const whole = once(() => absorbedLaw(t, starts, last));
  const ns = [0, 1, 2, 3, Math.floor(last * random()), last];
  for (const n of new Set(ns)) {
    ask(
      "p_n",
      `n = ${n}`,
      () => absorbedProbability(t, starts, n),
      () => reference.probability(law(), n),
    );
    ask(
      "p_n of the law",
      `n = ${n}`,
      () => termOf(whole(), n),
      () => reference.probability(law(), n),
    );
    ask(
      "P(K > n)",
      `n = ${n}`,
      () => absorbedAbove(t, starts, n),
      () => reference.above(law(), n),
    );
  }
  const settled = once(() => {
    const found = expansion();
    if (found === null) return Number.POSITIVE_INFINITY;
    const n = last - ((last - particlesOf(exactStarts)) % found.period);
    return exactFrom(reference.f, found, n, at(law(), n));
  });
  for (const n of FAR_OUT)
    ask(
      `p_n far out`,
      `n = ${n}`,
      () => absorbedProbability(t, starts, n),
      () => {
        const at0 = expansion();
        if (at0 === null || n < settled()) return null;
        return (n - particlesOf(exactStarts)) % at0.period === 0 ? singularProbability(reference.f, at0, n) : real(0n);
      },
    );
  aboutMoments(t, reference, starts, exactStarts, moments, ask);
  const tail = once(() => tailLaw(t, starts, 1));
  const tailValue = (read: (law: Exclude<ReturnType<typeof tail>, { refused: string }>) => Answer<ScaledEstimate>) => {
    const found = tail();
    return "refused" in found ? found : read(found);
  };
  const singularValue = (read: (e: NonNullable<ReturnType<typeof expansion>>) => Real) => () => {
    const e = expansion();
    return e === null || t.regime === "toward" ? null : read(e);
  };
  ask(
    "tail constant",
    "",
    () => tailValue((law) => asScaled(law.constant)),
    singularValue((e) => real(reference.tailConstant(e))),
  );
  const n = particlesOf(exactStarts) + 120 * Math.ceil(50 * random());
  ask(
    "tail law",
    `n = ${n}`,
    () => tailValue((law) => tailProbability(law, n).probability),
    singularValue((e) => reference.tailAt(e, n)),
  );
  return questions;
}

type Ask = (subject: string, detail: string, ours: () => Answer<ScaledEstimate>, truth: () => Real | null) => void;

function aboutMoments(
  t: Trajectory,
  reference: ReferenceAnswers,
  starts: Starts,
  exactStarts: ExactStarts,
  series: () => readonly bigint[],
  ask: Ask,
): void {
  const { f } = reference;
  const real = (units: bigint) => reference.real(units);
  const ours = once(() => absorbedMoments(t, starts));
  ask(
    "mean",
    "",
    () => scaledAnswer(ours().mean),
    () => real(at(series(), 1)),
  );
  ask(
    "variance",
    "",
    () => scaledAnswer(ours().variance),
    () => {
      const mean = at(series(), 1);
      return real(2n * at(series(), 2) + mean - f.multiply(mean, mean));
    },
  );
  if (exactStarts !== "far")
    ask(
      "P(K infinite)",
      "",
      () => scaledAnswer(ours().infinite),
      () => real(reference.infinite(exactStarts)),
    );
  let factorial = 1n;
  for (let j = 1; j <= HIGHEST_MOMENT; j += 1) {
    factorial *= BigInt(j);
    const own = factorial;
    ask(
      "factorial moment",
      `order ${j}`,
      () => scaledAnswer(factorialMoment(t, starts, j)),
      () => real(own * at(series(), j)),
    );
  }
}

function termOf(law: ReturnType<typeof absorbedLaw>, n: number): Answer<ScaledEstimate> {
  if ("refused" in law) return law;
  return { mantissa: law.mantissa[n] as number, exponent: law.exponent[n] as number, error: law.error[n] as number };
}

function particlesOf(starts: ExactStarts): number {
  return starts === "far" ? 1 : starts.reduce((sum, s) => sum + s.particles, 0);
}

/** The value of a computation, made at the first call. */
function once<T>(compute: () => T): () => T {
  let made: { value: T } | null = null;
  return () => {
    made ??= { value: compute() };
    return made.value;
  };
}
