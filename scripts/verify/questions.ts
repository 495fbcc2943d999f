import {
  type Answer,
  describeProcess,
  type Estimate,
  profileAt,
  profileComplementAt,
  profileConstants,
  profileSlopeAt,
  solveTrajectory,
  survivalProbability,
} from "../../app/solvers/index.ts";
import { type Decimal, decimalNear, type ExactModel, toFixed } from "./exact-model.ts";
import { aboutLaw } from "./law-questions.ts";
import { type Asked, type Question, scaledAnswer } from "./question.ts";
import { type ExactStarts, ReferenceAnswers, recursionBits } from "./reference-answers.ts";

/** Bits that the reference spends at most on the smallest probability: more n for laws that fall slowly. */
const MOST_BITS = 900;

/** Every answer about a model at random arguments, or the reason why there is no trajectory.
 *  @param upTo largest n whose law is compared term by term */
export function questionsAbout(
  exact: ExactModel,
  upTo: number,
  random: () => number,
): Question[] | { refused: string } {
  const { model } = exact;
  const t = solveTrajectory(model);
  if ("refused" in t) return t;
  const constants = profileConstants(t);
  const { decay } = t;
  const s0 = "refused" in constants.s0 ? 2 : constants.s0.value;
  // a recursion's rounding grows as if it met a singularity at the fixed point that the trajectory leaves
  const fixedPoint = t.regime === "away" ? 1 : Math.max(t.base.scale[0], 1e-6);
  const perTerm = Math.log2(Math.max(s0 / fixedPoint, 1.05));
  const last = Math.max(4, Math.min(upTo, Math.floor(MOST_BITS / perTerm)));
  const distance = () => decimalNear((0.02 * 400 ** random()) / decay[0], 1 + Math.floor(17 * random()), random);
  const x = distance();
  const starts = randomStarts(x, distance, random);
  const bits = recursionBits(last, perTerm, t.ratio[0]) + 3 * decay[0] * x.double + powerBits(model, last);
  const reference = new ReferenceAnswers(exact, Math.min(bits, 2500));
  const asked = { t, exact, reference, random };
  return [
    ...aboutProcess(asked),
    ...aboutConstants(asked),
    ...aboutProfiles(asked, x, s0),
    ...aboutLaw(asked, starts, last),
    ...(t.regime === "away" ? aboutLaw(asked, "far", last) : []),
  ];
}

/** Bits of n^{−1−d} at the largest n, where the law falls as a power. */
function powerBits({ drift, rate, diffusion, offspring }: ExactModel["model"], last: number): number {
  const description = describeProcess({ drift, rate, diffusion, offspring });
  if (description.regime !== "toward") return 0;
  const root = Math.sqrt(Math.max(0, drift * drift - 4 * diffusion * description.malthusian.value));
  return (1 + (root - drift) / Math.max(1e-9, -drift - root)) * (1 + Math.log2(last));
}

function randomStarts(x: Decimal, distance: () => Decimal, random: () => number): ExactStarts {
  if (random() < 0.7) return [{ position: x, particles: 1 }];
  const particles = 1 + Math.floor(3 * random());
  const other = distance();
  const nearer = other.double < x.double ? other : x;
  return [
    { position: nearer, particles },
    { position: decimalNear(nearer.double * 1.5, 3, random), particles: 1 },
  ];
}

function aboutProcess({ exact, reference }: Asked): Question[] {
  const d = describeProcess(exact.model);
  const { constants } = reference;
  const ask = (subject: string, ours: Answer<Estimate>, truth: bigint): Question => ({
    subject,
    detail: "",
    ours: () => scaledAnswer(ours),
    truth: () => reference.real(truth),
  });
  return [
    ask("mean offspring", d.meanOffspring, reference.mean),
    ask("Malthusian parameter", d.malthusian, constants.growth),
    ask("critical drift", d.criticalDrift, reference.criticalDrift),
    ask("extinction probability", d.extinctionProbability, constants.extinction),
    ask("decay", d.decay, reference.trajectory.decay),
    ask("far decay", d.farDecay, reference.farDecay),
  ];
}

function aboutConstants({ t, reference }: Asked): Question[] {
  const c = profileConstants(t);
  const ask = (subject: string, ours: Answer<Estimate>, truth: () => bigint | null): Question => ({
    subject,
    detail: "",
    ours: () => scaledAnswer(ours),
    truth: () => {
      const value = truth();
      return value === null ? null : reference.real(value);
    },
  });
  return [
    ask("s0", c.s0, () => reference.s0),
    ask("amplitude", c.amplitude, () => reference.amplitude),
    ask("slope at the barrier", c.slopeAtBarrier, () => reference.slopeAtBarrier),
  ];
}

function aboutProfiles({ t, reference, random }: Asked, x: Decimal, s0: number): Question[] {
  const { f } = reference;
  const places = [x, decimalNear(x.double * random(), 4, random)];
  const top = t.regime === "toward" ? 1 : s0;
  const values = [0, 1, -1 + 2 * random(), random() * top, top - (top - 1) * 10 ** (-6 * random())].filter(
    (s) => s < s0,
  );
  const questions: Question[] = places.map((p) => ({
    subject: "survival",
    detail: `x = ${p.double}`,
    ours: () => scaledAnswer(survivalProbability(t.model, p.double)),
    truth: () => {
      const value = reference.survival(toFixed(f, p));
      return value === null ? null : reference.real(value);
    },
  }));
  for (const p of places) {
    const atTop = () => reference.profileAtTop(toFixed(f, p));
    if (!("refused" in profileConstants(t).s0) && t.regime !== "toward")
      questions.push(
        profileQuestion(reference, "w at s0", p, s0, profileAt(t, p.double, s0), () => atTop()?.value),
        profileQuestion(reference, "slope at s0", p, s0, profileSlopeAt(t, p.double, s0), () => atTop()?.slope),
      );
    for (const value of values) {
      const s = decimalNear(value, 4 + Math.floor(13 * random()), random);
      if (s.double > top) continue;
      const read = () => reference.profile(toFixed(f, p), toFixed(f, s));
      questions.push(
        profileQuestion(reference, "w", p, s.double, profileAt(t, p.double, s.double), () => read()?.value),
        profileQuestion(
          reference,
          "slope of w",
          p,
          s.double,
          profileSlopeAt(t, p.double, s.double),
          () => read()?.slope,
        ),
        profileQuestion(reference, "1 - w", p, s.double, profileComplementAt(t, p.double, s.double), () => {
          const at = read();
          return at && f.one - at.value;
        }),
      );
    }
  }
  return questions;
}

function profileQuestion(
  reference: ReferenceAnswers,
  subject: string,
  x: Decimal,
  s: number,
  ours: Answer<Estimate>,
  truth: () => bigint | null | undefined,
): Question {
  return {
    subject,
    detail: `x = ${x.double}, s = ${s}`,
    ours: () => scaledAnswer(ours),
    truth: () => {
      const value = truth();
      return value === null || value === undefined ? null : reference.real(value);
    },
  };
}
