import type { Figure, TableData } from "../figures/index.ts";
import type { Formula, Quantity, Value } from "../formulas/index.ts";
import type { Cell, Problem } from "../paper/index.ts";
import type { Cost } from "./kind.ts";

/**
 * A paper planned: which cells there are, in dependency order, each with its key.
 * Pure function of the paper's text (and of overrides of parameters); nothing is computed yet.
 */
export interface Plan {
  readonly parameters: readonly PlannedParameter[];
  /** In dependency order; cells with problems have `key` null. */
  readonly cells: readonly PlannedCell[];
  readonly byId: ReadonlyMap<string, PlannedCell>;
  readonly problems: readonly Problem[];
  /** TeX macros of the front matter, for the labels of figures. */
  readonly macros: Readonly<Record<string, string>>;
}

export interface PlannedParameter {
  readonly name: string;
  /** Source of its formula, and where it stands in the text (what the rule edits). */
  readonly source: string;
  readonly from: number;
  readonly to: number;
  readonly line: number;
  readonly value: Value;
  readonly min: number | null;
  readonly max: number | null;
  readonly step: number | null;
  /** TeX; the name itself, Greek where it is a Greek letter, when none is given. */
  readonly symbol: string;
  readonly unit: string;
  readonly note: string;
  /** Overridden for a preview or by --set. */
  readonly overridden: boolean;
  /** null: it could not be read. */
  readonly formula: Formula | null;
  /** Parameters it is computed from, directly and through others. */
  readonly reads: readonly string[];
}

export interface PlannedCell {
  readonly cell: Cell;
  readonly id: string;
  readonly slot: string;
  readonly kind: string;
  readonly line: number;
  /** SHA-256, hex. null: the body has problems ("failed"), or that of a cell it reads has ("waiting"). */
  readonly key: string | null;
  /** First problem's message when the body is at fault; null with `key` null: it waits for a cell (of `needs`) that is. */
  readonly failure: { readonly line: number; readonly message: string } | null;
  /** Ids of the cells it reads directly. */
  readonly needs: readonly string[];
  /** Parameters it reads, itself or through the cells it needs, in declaration order (strands). */
  readonly parameters: readonly string[];
  /** Values of those parameters at planning, for the cause ("set with μ = 1.90; μ is now 2.00"). */
  readonly parameterValues: Readonly<Record<string, string>>;
  /** SHA-256 of what enters the key apart from parameters: tells "its working was changed" from a parameter's change. */
  readonly workingKey: string | null;
  /** Checked body, JSON-safe: what a worker needs, with the parameters' values. null when key is null. */
  readonly task: CellTask | null;
  /** Which parts appear: "figure", "table", "points". Empty: prints nothing. */
  readonly show: readonly string[];
  /** True for kinds that take milliseconds: their results may be previewed in the page. */
  readonly quick: boolean;
  /** What varying costs, where it is known before anything is computed. */
  readonly cost: Cost | null;
}

/** Plain JSON; can be posted to a worker thread. */
export interface CellTask {
  readonly id: string;
  readonly key: string;
  readonly kind: string;
  /** The kind's checked model: formulas as trees, choices as strings. */
  readonly model: unknown;
  readonly parameters: Readonly<Record<string, Quantity>>;
  /** id → key, of the cells it reads. */
  readonly needs: Readonly<Record<string, string>>;
  /** Lines within the paper of the body's entries ("drift", "columns.ratio"; "" the cell itself): for failures, never in the key. */
  readonly lines: Readonly<Record<string, number>>;
  /** Where the cell varies parameters: what is computed again for each of their values, in order. */
  readonly recomputed?: {
    readonly varied: readonly string[];
    readonly parameters: readonly { readonly name: string; readonly formula: Formula }[];
    readonly cells: readonly CellTask[];
  };
}

/** What a computed cell is, plain JSON, kept in the database under its key. Equal key, equal result. */
export interface CellResult {
  readonly key: string;
  readonly kind: string;
  /** Named values in the order of the language's table (refused ones with their reason). */
  readonly values: Readonly<Record<string, Value>>;
  /** The kind's own data, from which its callables, figure and table are made. */
  readonly data: unknown;
  /** "Saddle contour, 256 nodes; D = 1/2, …": the method that ran, for the provenance line. */
  readonly method: string;
  readonly solver: string;
  /** The solver's own seconds. */
  readonly seconds: number;
}

/** A cell that could not compute, or waits on one that could not. */
export interface CellFailure {
  readonly key: string;
  /** Line within the paper, of the body's entry at fault where known. */
  readonly line: number;
  readonly message: string;
}

export type Outcome =
  | { readonly status: "computed"; readonly result: CellResult }
  | { readonly status: "failed"; readonly failure: CellFailure }
  | { readonly status: "waiting"; readonly needs: readonly string[] };

/** What `print` makes of a result for the page, the galley and the export alike. */
export interface CellView {
  readonly figure: Figure | null;
  readonly table: TableData | null;
  /** The data table behind the figure. */
  readonly points: TableData | null;
}

/** What a result says of itself beside its values and its view, where its cell stands. */
export interface Finding {
  /** It needs attention, and is marked ‡. */
  readonly isGrave: boolean;
  /** Whole sentences. */
  readonly words: string;
}

/**
 * What a paper shows: a second Y.Doc of the paper, which only the server writes.
 * Y.Map "cells": slot → ShownCell. Y.Map "work": slot → CellWork. Y.Map "changes": parameter name → ParameterChange.
 */
export interface ShownCell {
  readonly key: string;
  /** ISO time and display name of who computed it, written by the server. */
  readonly at: string;
  readonly by: string;
  readonly seconds: number;
  readonly solver: string;
  readonly parameterValues: Readonly<Record<string, string>>;
  readonly workingKey: string;
  /** Left standing on purpose although out of date. */
  readonly stands?: { readonly by: string; readonly at: string };
}

/**
 * Work on a cell:  (none) ──asked──▶ waiting ──its needs are met──▶ computing ──▶ (none, and `cells` has the new key)
 *                                        │                              ├──▶ failed     (kept until the cell's key changes)
 *                                        └──────────────────────────────┴──▶ cancelled  (kept until asked again)
 */
export type CellWork =
  | {
      readonly state: "waiting";
      readonly key: string;
      readonly by: string;
      readonly begun: string;
      readonly needs: readonly string[];
    }
  | {
      readonly state: "computing";
      readonly key: string;
      readonly by: string;
      readonly begun: string;
      readonly done: number;
      readonly total: number;
    }
  | {
      readonly state: "failed";
      readonly key: string;
      readonly by: string;
      readonly at: string;
      readonly line: number;
      readonly message: string;
    }
  | { readonly state: "cancelled"; readonly key: string; readonly by: string; readonly at: string };

export interface ParameterChange {
  readonly by: string;
  readonly at: string;
  readonly was: string;
}

/** The whole of what a paper shows, as read from its second document. Keys of `cells` and `work` are slots. */
export interface ShownPaper {
  readonly cells: ReadonlyMap<string, ShownCell>;
  readonly work: ReadonlyMap<string, CellWork>;
  /** By parameter. */
  readonly changes: ReadonlyMap<string, ParameterChange>;
}

/** Why a result is out of date. Parameter values are as printed. */
export type Cause =
  | {
      readonly cause: "parameter";
      readonly name: string;
      /** TeX */
      readonly symbol: string;
      readonly was: string;
      readonly now: string;
      readonly by: string | null;
      /** ISO time, or null when not known. */
      readonly at: string | null;
    }
  | { readonly cause: "working" }
  | { readonly cause: "solver"; readonly was: string; readonly now: string }
  /** A cell it reads was changed otherwise than by a parameter. */
  | { readonly cause: "needs"; readonly id: string };

/** State of a cell as a page shows it; the words are design's. */
export interface CellState {
  readonly state: "current" | "outOfDate" | "stands" | "computing" | "waiting" | "failed" | "cancelled" | "empty";
  /** For outOfDate and stands. */
  readonly causes: readonly Cause[];
  /** For failed: where and what. */
  readonly failure: { readonly line: number; readonly message: string } | null;
  /** For waiting: ids of the cells it waits for. */
  readonly waitsFor: readonly string[];
  /** True when a result (perhaps an older one) is shown. */
  readonly hasResult: boolean;
}
