import type { CellResult, CellWork, ParameterChange, ShownCell } from "../../cells/index.ts";
import type { Borders } from "./borders.ts";
import type { CellFace, SheetModel } from "./types.ts";

/**
 * What the page tells its worker. Messages that lie in its queue together are answered together, with the newest
 * state; an answer says how many it answers.
 */
export type ToWorker =
  | { readonly tell: "text"; readonly version: number; readonly text: string; readonly bibliography: string }
  /** A text that will most likely be told: to be read already. It is not answered. */
  | { readonly tell: "ahead"; readonly text: string; readonly bibliography: string }
  /** What has changed in the text told before. */
  | {
      readonly tell: "edits";
      readonly version: number;
      readonly edits: readonly TextEdit[];
      readonly bibliography: string;
    }
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
    }
  /** What these formulas are by the results that are shown. Answered by itself, with its number, and changes nothing. */
  | { readonly tell: "values"; readonly question: number; readonly formulas: readonly string[] };

/** What a formula is now, as a sentence would print it. */
export interface ValueNow {
  readonly formula: string;
  /** Supported digits; "" where there is no value. */
  readonly known: string;
  /** Digits which the error does not support: grey. */
  readonly unknown: string;
  readonly rest: string;
  /** Why there is no value; "" where there is one. */
  readonly reason: string;
}

/** Places are those of the text before all edits of the message; they come in its order and do not overlap. */
export interface TextEdit {
  readonly from: number;
  readonly to: number;
  readonly insert: string;
}

/** A message as it is posted. */
export interface Told {
  readonly message: ToWorker;
  /** Number of the answer whose pieces the page has; 0: none. */
  readonly have: number;
}

/** A cell that looks as it did, where it stands now. */
export type CellPlace = Pick<CellFace, "slot" | "from" | "to" | "line">;

/** The sheet as it is posted: parts that the page has already are left out (model/packing.ts). */
export type PackedSheet = Pick<SheetModel, "version" | "pieces" | "views" | "preview"> &
  Partial<Omit<SheetModel, "version" | "pieces" | "views" | "preview" | "cells">> & {
    readonly cells: readonly (CellFace | CellPlace)[];
  };

export type FromWorker =
  | { readonly tell: "sheet"; readonly answers: number; readonly model: PackedSheet; readonly seconds: number }
  /** Where along the parameters cells answer otherwise, by parameter; found while the worker has nothing else to do. */
  | { readonly tell: "borders"; readonly answers: 0; readonly borders: Borders }
  | { readonly tell: "values"; readonly answers: 0; readonly question: number; readonly values: readonly ValueNow[] }
  /** The sheet could not be made; the one before stays. */
  | { readonly tell: "fault"; readonly answers: number; readonly message: string };
