import type { Answer, Estimate, ScaledEstimate, Trajectory } from "../../app/solvers/index.ts";
import type { ExactModel } from "./exact-model.ts";
import type { Real } from "./fixed.ts";
import { asScaled } from "./judge.ts";
import type { ReferenceAnswers } from "./reference-answers.ts";

/** One number asked of the solvers and of the reference. */
export interface Question {
  /** what is asked for, by which the verdicts are told apart */
  readonly subject: string;
  /** with which arguments */
  readonly detail: string;
  readonly ours: () => Answer<ScaledEstimate>;
  /** null where the reference does not reach */
  readonly truth: () => Real | null;
}

/** What questions are asked about, of whom, and the source of their arguments. */
export interface Asked {
  readonly t: Trajectory;
  readonly exact: ExactModel;
  readonly reference: ReferenceAnswers;
  readonly random: () => number;
}

/** An answer with its own power of two. */
export const scaledAnswer = (answer: Answer<Estimate>): Answer<ScaledEstimate> =>
  "refused" in answer ? answer : asScaled(answer);
