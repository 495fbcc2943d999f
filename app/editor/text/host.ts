import { Facet, type TransactionSpec } from "@codemirror/state";
import { createStore, type Store } from "../live/store.ts";
import type { CellFace, SheetModel, ShownView } from "../model/types.ts";
import { PLATES_AT_REST, type PlatesView } from "../plates/types.ts";

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

/** A command offered with what is said. */
export interface Offer {
  readonly name: string;
  act(): void;
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
  /** What becomes of the plates on this page alone. */
  readonly plates: Store<PlatesView>;
  /** Says something in the tail line, with a command that is offered, and to those who listen. */
  tell(words: string, offer?: Offer): void;
  /** One edit of the text, and one step to undo; entries for the bibliography may come with it. */
  edit(change: TransactionSpec, bibtex?: string): void;
  /** Of the text [px]; plates are drawn to it. */
  columnWidth: number;
}

/** Takes in the macros of an answer, and the views that it told anew; null: its cell has none any more. */
export function takeSheet(host: SheetHost, { macros, views }: Pick<SheetModel, "macros" | "views">): void {
  host.macros = macros;
  for (const [slot, view] of Object.entries(views)) {
    if (view === null) host.views.delete(slot);
    else host.views.set(slot, view);
  }
}

/** What the page knows before its first answer. */
export function hostAtRest(): Pick<SheetHost, "macros" | "views" | "plates" | "columnWidth"> {
  return { macros: {}, views: new Map(), plates: createStore(PLATES_AT_REST), columnWidth: 660 };
}

/** The page around the text; one for each editor. The last one given wins, and there must be one. */
export const sheetHost = Facet.define<SheetHost, SheetHost | null>({
  combine: (hosts) => hosts.at(-1) ?? null,
});
