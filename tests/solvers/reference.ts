import { type ProcessModel, solveTrajectory, type Trajectory } from "../../app/solvers/index.ts";
import { isRefused } from "./answers.ts";
import stored from "./reference.json" with { type: "json" };

/** Reference values to 25 digits as decimal strings; the source of all of them stands in the file. */
export interface ReferenceLaw {
  readonly x: number;
  readonly mean: string;
  readonly variance: string;
  readonly tailConstant: string;
  readonly p: Readonly<Record<string, string>>;
  /** exact over asymptotic */
  readonly ratio: Readonly<Record<string, string>>;
}

export interface ReferenceEntry {
  readonly id: string;
  readonly model: ProcessModel;
  readonly decay: string;
  readonly slopeAtBarrier: string;
  readonly amplitude: string;
  readonly s0: string;
  readonly amplitudeAtS0: string;
  /** by x */
  readonly w0: Readonly<Record<string, string>>;
  readonly complement0: Readonly<Record<string, string>>;
  readonly wS0: Readonly<Record<string, string>>;
  readonly excessS0: Readonly<Record<string, string>>;
  readonly slopeS0: Readonly<Record<string, string>>;
  readonly laws: readonly ReferenceLaw[];
  readonly limit: {
    readonly mean: string;
    readonly tailConstant: string;
    readonly p: Readonly<Record<string, string>>;
  };
}

export const references = stored.entries as unknown as readonly ReferenceEntry[];
export const integrable = stored.integrable;

/** The trajectory of a model that must have one. */
export function trajectoryOf(model: ProcessModel): Trajectory {
  const t = solveTrajectory(model);
  if (isRefused(t)) throw new Error(`refused: ${t.refused}`);
  return t;
}

/** Binary branching at rate 1 with D = 1/2, the field's standard example. */
export function binary(drift: number): ProcessModel {
  return { drift, rate: 1, diffusion: 0.5, offspring: { law: "finite", probabilities: [0, 0, 1] } };
}
