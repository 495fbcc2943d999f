import type { EditorView } from "@codemirror/view";
import type { Desk } from "../live/desk.ts";
import type { Store } from "../live/store.ts";
import type { StrandWatch } from "../strands/watch.ts";
import type { Binding } from "./binding.ts";

/** What may stand between rules above the tail line, or beneath the parameter rule; one at a time. */
export type StripName = "commands" | "find" | "rename" | "outline" | "errata" | "axes" | "case" | "quote" | "parameter";

/** What the strip shows and what the composing key waits for. */
export interface Strips {
  readonly open: StripName | null;
  /** The name that it was opened with: of the parameter to change, or of what to rename; null: with none. */
  readonly about: string | null;
  /** The composing key was pressed: the next key is a command's letter. */
  readonly composing: boolean;
  readonly binding: Binding;
}

/** The sheet as commands find it. */
export interface SheetAtHand {
  readonly desk: Desk;
  readonly view: EditorView;
  readonly strands: StrandWatch | null;
  readonly strips: Store<Strips>;
  readonly writes: boolean;
  readonly paperId: string;
  readonly signedIn: boolean;
  /** Leaves for another address of the application. */
  leaveFor(address: string): void;
}

/** The groups of the list, in its order. */
export type CommandGroup = "Places" | "Cells" | "Figures" | "Errata and strands" | "Text";

/** One command of the sheet: the composing key, the list of keys and the menu are made from these. */
export interface SheetCommand {
  readonly id: string;
  readonly group: CommandGroup;
  /** As it stands in the list: what it does, in the words of the interface. */
  readonly words: string;
  /** After the composing key; null: in the list alone. */
  readonly letter: string | null;
  /** For those who write alone. */
  readonly writing?: boolean;
  /** Why it cannot be done now, as a sentence; "" when it can. */
  unavailable?(sheet: SheetAtHand): string;
  act(sheet: SheetAtHand): void;
}
