import type { CellResult, CellWork, ParameterChange, ShownCell } from "../../cells/index.ts";
import type { SheetModel } from "./types.ts";

/**
 * What the page tells its worker. Messages that lie in its queue together are answered together, with the newest
 * state; an answer says how many it answers.
 */
export type ToWorker =
  | { readonly tell: "text"; readonly version: number; readonly text: string; readonly bibliography: string }
  | {
      readonly tell: "shown";
      readonly cells: Readonly<Record<string, ShownCell>>;
      readonly work: Readonly<Record<string, CellWork>>;
      readonly changes: Readonly<Record<string, ParameterChange>>;
    }
  | { readonly tell: "results"; readonly results: readonly CellResult[] }
  /**
   * Parameters tried privately, name → source of a formula. `settled`: a visitor's own values, which stay on the rule;
   * `trial`: the value under the hand, which the rule shows by itself.
   */
  | {
      readonly tell: "preview";
      readonly settled: Readonly<Record<string, string>>;
      readonly trial: Readonly<Record<string, string>>;
    };

/** A message as it is posted. */
export interface Told {
  readonly message: ToWorker;
  /** Number of the answer whose pieces the page has; 0: none. */
  readonly have: number;
}

export type FromWorker =
  | { readonly tell: "sheet"; readonly answers: number; readonly model: SheetModel; readonly seconds: number }
  /** The sheet could not be made; the one before stays. */
  | { readonly tell: "fault"; readonly answers: number; readonly message: string };
