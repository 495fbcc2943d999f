import { foldRefused, noSections, turnEverySection, turnSectionAtCaret } from "../folding/fold-acts.ts";
import { TO_RECOMPUTE } from "../live/desk-view.ts";
import { followBack, followStrand } from "../strands/follow.ts";
import { cellAtHand, isWorkingOpen } from "./cell-at-hand.ts";
import { goToErratum } from "./errata-walk.ts";
import { FIGURE_COMMANDS } from "./figure-commands.ts";
import { RULE_COMMANDS } from "./rule-commands.ts";
import { turnTheme } from "./theme.ts";
import type { CommandGroup, SheetAtHand, SheetCommand } from "./types.ts";

/** In the order of the list. A new command of the sheet is one entry here. */
export const SHEET_COMMANDS: readonly SheetCommand[] = [
  {
    id: "galley",
    group: "Places",
    words: "Galley",
    letter: "g",
    act: (sheet) => sheet.leaveFor(`/papers/${sheet.paperId}/galley`),
  },
  { id: "errata", group: "Places", words: "Errata", letter: "x", act: opens("errata") },
  { id: "outline", group: "Places", words: "Outline", letter: "o", act: opens("outline") },
  { id: "find", group: "Places", words: "Find", letter: "s", act: opens("find") },
  {
    id: "marks",
    group: "Places",
    words: "Marks and strands",
    letter: null,
    unavailable: strandsAway,
    act: ({ strands }) => strands?.cycleMode(),
  },
  { id: "manual", group: "Places", words: "Manual", letter: null, act: (sheet) => sheet.leaveFor("/manual") },
  {
    id: "theme",
    group: "Places",
    words: "Light or dark",
    letter: null,
    act: ({ desk }) => void turnTheme((words) => desk.tell(words)),
  },
  {
    id: "title-page",
    group: "Places",
    words: "Title page",
    letter: null,
    unavailable: signedOut,
    act: (sheet) => sheet.leaveFor(`/papers/${sheet.paperId}/title-page`),
  },
  {
    id: "recompute",
    group: "Cells",
    words: "Recompute the cell at the caret",
    letter: "r",
    writing: true,
    unavailable: cellUnready,
    act: withCell((sheet, cell) => sheet.desk.cellCommands.recompute(cell)),
  },
  {
    id: "recompute-all",
    group: "Cells",
    words: "Recompute all",
    letter: "a",
    writing: true,
    unavailable: nothingDue,
    act: ({ desk }) => desk.recomputeAll(),
  },
  {
    id: "let-stand",
    group: "Cells",
    words: "Let it stand",
    letter: "t",
    writing: true,
    unavailable: notOutOfDate,
    act: withCell((sheet, cell) => sheet.desk.cellCommands.letStand(cell)),
  },
  {
    id: "working",
    group: "Cells",
    words: "Show or put away the working",
    letter: "w",
    unavailable: noCell,
    act: withCell(turnWorking),
  },
  ...RULE_COMMANDS,
  ...FIGURE_COMMANDS,
  {
    id: "next-erratum",
    group: "Errata and strands",
    words: "Next erratum",
    letter: "e",
    unavailable: noErrata,
    act: (sheet) => goToErratum(sheet, 1),
  },
  {
    id: "previous-erratum",
    group: "Errata and strands",
    words: "Previous erratum",
    letter: "E",
    unavailable: noErrata,
    act: (sheet) => goToErratum(sheet, -1),
  },
  {
    id: "follow",
    group: "Errata and strands",
    words: "Follow the strand to its source",
    letter: "f",
    act: ({ desk, view }) => said(followStrand(view), desk, "Nothing is lit here that leads further."),
  },
  {
    id: "back",
    group: "Errata and strands",
    words: "Back to where I was",
    letter: "b",
    act: ({ desk, view }) => said(followBack(view), desk, "No strand was followed."),
  },
  {
    id: "case",
    group: "Text",
    words: "Open the case",
    letter: "c",
    writing: true,
    act: opens("case"),
  },
  {
    id: "fold",
    group: "Text",
    words: "Fold or unfold the section",
    letter: "h",
    unavailable: ({ view }) => foldRefused(view),
    act: ({ view }) => turnSectionAtCaret(view),
  },
  {
    id: "fold-all",
    group: "Text",
    words: "Fold or unfold every section",
    letter: "H",
    unavailable: ({ view }) => noSections(view),
    act: ({ view }) => turnEverySection(view),
  },
  {
    id: "quote",
    group: "Text",
    words: "Quote a value",
    letter: "q",
    writing: true,
    act: opens("quote"),
  },
  {
    id: "rename",
    group: "Text",
    words: "Rename a parameter, cell or label",
    letter: "m",
    writing: true,
    act: opens("rename"),
  },
  { id: "commands", group: "Text", words: "This list", letter: "?", act: opens("commands") },
];

export const COMMAND_GROUPS: readonly CommandGroup[] = ["Places", "Cells", "Figures", "Errata and strands", "Text"];

/** Those that a person may give on this sheet. */
export function commandsFor(writes: boolean): readonly SheetCommand[] {
  return SHEET_COMMANDS.filter((command) => writes || command.writing !== true);
}

/** The command of a letter; where only the other case of it has one, that. */
export function commandOf(letter: string, writes: boolean): SheetCommand | null {
  const commands = commandsFor(writes);
  return (
    commands.find((command) => command.letter === letter) ??
    commands.find((command) => command.letter !== null && command.letter.toLowerCase() === letter.toLowerCase()) ??
    null
  );
}

/** Does a command, or says why it cannot be done. */
export function give(command: SheetCommand, sheet: SheetAtHand): void {
  const why = command.unavailable?.(sheet) ?? "";
  if (why === "") command.act(sheet);
  else sheet.desk.tell(why);
}

function opens(open: NonNullable<ReturnType<SheetAtHand["strips"]["get"]>["open"]>): SheetCommand["act"] {
  return ({ strips }) => strips.set({ open, about: null });
}

type FaceAtHand = NonNullable<ReturnType<typeof cellAtHand>>;

function withCell(act: (sheet: SheetAtHand, cell: FaceAtHand) => void): SheetCommand["act"] {
  return (sheet) => {
    const cell = cellAtHand(sheet);
    if (cell !== null) act(sheet, cell);
  };
}

function turnWorking(sheet: SheetAtHand, { slot }: FaceAtHand): void {
  const { showWorking, putAway } = sheet.desk.cellCommands;
  if (isWorkingOpen(sheet, slot)) putAway(slot);
  else showWorking(slot);
}

function said(done: boolean, desk: SheetAtHand["desk"], otherwise: string): void {
  if (!done) desk.tell(otherwise);
}

function noCell(sheet: SheetAtHand): string {
  return cellAtHand(sheet) === null
    ? "There is no cell at the caret: put it in a working, or go to a plate with Tab."
    : "";
}

function cellUnready(sheet: SheetAtHand): string {
  const cell = cellAtHand(sheet);
  if (cell === null) return noCell(sheet);
  return cell.sound ? "" : `The working of ${cell.title} is at fault; mend it first.`;
}

function notOutOfDate(sheet: SheetAtHand): string {
  const cell = cellAtHand(sheet);
  if (cell === null) return noCell(sheet);
  return cell.state === "outOfDate" && cell.hasResult ? "" : `${cell.title} is not out of date.`;
}

function nothingDue({ desk }: SheetAtHand): string {
  const due = desk.store.get().model?.cells.some((cell) => cell.sound && TO_RECOMPUTE.has(cell.state)) ?? false;
  return due ? "" : "Every cell is current.";
}

function noErrata({ desk }: SheetAtHand): string {
  return (desk.store.get().model?.errata.length ?? 0) > 0 ? "" : "Errata none. Every number is current.";
}

function strandsAway({ strands }: SheetAtHand): string {
  return strands === null ? "The strands are not drawn yet." : "";
}

function signedOut({ signedIn }: SheetAtHand): string {
  return signedIn ? "" : "This is for those who have signed in.";
}
