import type { Kept } from "../kept.ts";
import type { Borders } from "../model/borders.ts";
import type { CellFace, SheetModel } from "../model/types.ts";
import type { Offer } from "../text/host.ts";
import type { Connection } from "./connection.ts";

/** What the parts around the text watch. */
export interface DeskView {
  readonly model: SheetModel | null;
  readonly connection: Connection;
  readonly kept: Kept;
  readonly people: readonly string[];
  /** A refusal, or word of a joining; null when there is nothing to say. */
  readonly notice: { readonly words: string; readonly amiss: boolean; readonly offer?: Offer } | null;
  readonly heard: string;
  /** Where along the parameters cells answer otherwise, as far as it is known. */
  readonly borders: Borders;
  /** The text stands on the sheet. */
  readonly ready: boolean;
}

/** States from which "Recompute all" sets out. What stands on purpose is left standing. */
export const TO_RECOMPUTE: ReadonlySet<CellFace["state"]> = new Set<CellFace["state"]>([
  "outOfDate",
  "cancelled",
  "empty",
  "failed",
]);

/** Before anything has come. */
export const FIRST_VIEW: DeskView = {
  model: null,
  connection: { state: "joining" },
  kept: { all: false, at: null },
  people: [],
  notice: null,
  heard: "",
  borders: {},
  ready: false,
};

/** How long the tail line says what was done, and how long it offers a command with it, in ms. */
export const TOLD_MS = { words: 12_000, offer: 60_000 } as const;
