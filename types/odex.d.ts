/** The part of odex that is used here; the package ships no declarations and its sources do not pass strict checks. */
declare module "odex" {
  export enum Outcome {
    Converged = 0,
    MaxStepsExceeded = 1,
    EarlyReturn = 2,
  }
  export type Derivative = (x: number, y: number[]) => number[];
  /** Valid only inside the callback it is handed to; undefined on the first call. */
  export type DenseOutput = (component: number, x: number) => number;
  export class Solver {
    constructor(dimension: number);
    absoluteTolerance: number | number[];
    relativeTolerance: number | number[];
    initialStepSize: number;
    maxStepSize: number;
    maxSteps: number;
    denseOutput: boolean;
    solve(
      f: Derivative,
      x0: number,
      y0: number[],
      x1: number,
      onStep?: (n: number, x0: number, x1: number, y: number[], dense: DenseOutput | undefined) => boolean | undefined,
    ): { y: number[]; outcome: Outcome; nStep: number; nAccept: number; nReject: number; nEval: number };
  }
}
