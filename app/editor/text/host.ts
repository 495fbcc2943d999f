import { Facet } from "@codemirror/state";
import type { CellFace, ShownView } from "../model/types.ts";

/** What a person may ask of a cell on the sheet. */
export interface CellCommands {
  recompute(cell: CellFace): void;
  cancel(cell: CellFace): void;
  letStand(cell: CellFace): void;
  showWorking(slot: string): void;
  putAway(slot: string): void;
  goToCell(slot: string): void;
  goToLine(line: number): void;
}

/** What the typeset pieces of the text need from the page around them. */
export interface SheetHost {
  readonly commands: CellCommands;
  /** The address of a cell's plate. */
  plateOf(id: string): string;
  /** May change the text and recompute. */
  readonly writes: boolean;
  /** TeX macros of the front matter, of the newest answer. */
  macros: Readonly<Record<string, string>>;
  readonly views: Map<string, ShownView>;
  /** Of the text [px]; plates are drawn to it. */
  columnWidth: number;
}

/** The page around the text; one for each editor. The last one given wins, and there must be one. */
export const sheetHost = Facet.define<SheetHost, SheetHost | null>({
  combine: (hosts) => hosts.at(-1) ?? null,
});
