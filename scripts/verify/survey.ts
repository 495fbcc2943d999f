import { SolverError } from "../../app/solvers/errors.ts";
import { type ExactModel, KINDS, type Kind, randomModel } from "./exact-model.ts";
import { judge, type Verdict } from "./judge.ts";
import type { Question } from "./question.ts";
import { questionsAbout } from "./questions.ts";

/** What became of one question. */
export interface Outcome {
  readonly kind: Kind;
  readonly subject: string;
  readonly detail: string;
  readonly exact: ExactModel;
  /** null: refused, or beyond the reference */
  readonly verdict: Verdict | null;
  /** what the solver said where it gave no number */
  readonly refused?: string;
  readonly failed?: string;
}

/** mulberry32: a stream of numbers in [0, 1) from a seed. Source: public domain, from memory; only spread and repeatability matter here. */
export function stream(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

export interface SurveySettings {
  readonly count: number;
  readonly seed: number;
  /** largest n whose law is compared term by term */
  readonly upTo: number;
  readonly kinds?: readonly Kind[];
}

/** Asks about `count` random models of all kinds in turn; model i depends on the seed and i alone. */
export function* survey({ count, seed, upTo, kinds = KINDS }: SurveySettings): Generator<Outcome> {
  for (let i = 0; i < count; i += 1) {
    const kind = kinds[i % kinds.length] as Kind;
    const random = stream(seed * 1_000_003 + i);
    yield* outcomesOf(kind, randomModel(kind, random), upTo, random);
  }
}

function* outcomesOf(kind: Kind, exact: ExactModel, upTo: number, random: () => number): Generator<Outcome> {
  const base = { kind, exact, verdict: null };
  const questions = attempt(() => questionsAbout(exact, upTo, random));
  if ("failed" in questions || "refused" in questions) {
    yield { ...base, subject: "trajectory", detail: "", ...questions };
    return;
  }
  for (const question of questions) {
    const { subject, detail } = question;
    yield { ...base, subject, detail, ...verdictOn(question) };
  }
}

function verdictOn({ ours, truth }: Question): Pick<Outcome, "verdict" | "refused" | "failed"> {
  const answer = attempt(ours);
  if ("failed" in answer || "refused" in answer) return { verdict: null, ...answer };
  const reference = truth();
  return { verdict: reference === null ? null : judge(answer, reference) };
}

/** A solver that cannot vouch for a number says so; anything else that it throws is a fault. */
function attempt<T extends object>(compute: () => T): T | { failed: string } {
  try {
    return compute();
  } catch (error) {
    if (error instanceof SolverError && error.code === "not_converged") return { failed: error.message };
    throw error;
  }
}
