import type { CellFace } from "../model/types.ts";
import { type CopyAs, copyFigure, readFigure, setAxes } from "../plates/figure-acts.ts";
import { type SheetHost, sheetHost } from "../text/host.ts";
import { cellAtHand } from "./cell-at-hand.ts";
import type { SheetAtHand, SheetCommand } from "./types.ts";

/** What may be done with the figure at hand: the plate that has the keys, or the one of the working with the caret. */
export const FIGURE_COMMANDS: readonly SheetCommand[] = [
  {
    id: "read-figure",
    group: "Figures",
    words: "Read the figure",
    letter: "l",
    unavailable: noFigure,
    act: withFigure((host, face, { desk }) => {
      desk.show(face.from);
      readFigure(host.plates, face);
    }),
  },
  {
    id: "plate",
    group: "Figures",
    words: "Open as plate",
    letter: null,
    unavailable: noFigure,
    act: withFigure((host, face, sheet) => sheet.leaveFor(host.plateOf(face.id))),
  },
  {
    id: "axes",
    group: "Figures",
    words: "Set the axes",
    letter: "y",
    writing: true,
    unavailable: noAxes,
    act: withFigure((host, face) => setAxes(host.plates, face)),
  },
  copying("svg", "Copy as SVG"),
  copying("png", "Copy as PNG"),
  copying("csv", "Copy points (CSV)"),
];

function copying(as: CopyAs, words: string): SheetCommand {
  return {
    id: `copy-${as}`,
    group: "Figures",
    words,
    letter: null,
    unavailable: noFigure,
    act: withFigure((host, face) => void copyFigure(host, face, as)),
  };
}

function withFigure(act: (host: SheetHost, face: CellFace, sheet: SheetAtHand) => void): SheetCommand["act"] {
  return (sheet) => {
    const face = cellAtHand(sheet);
    const host = sheet.view.state.facet(sheetHost);
    if (face !== null && host !== null) act(host, face, sheet);
  };
}

function noFigure(sheet: SheetAtHand): string {
  const face = cellAtHand(sheet);
  if (face === null) return "There is no figure at the caret: put it in a working, or go to a plate with Tab.";
  if (!face.parts.some(({ part }) => part === "figure")) return `${face.title} shows no figure.`;
  return figureOf(sheet, face) === null ? `${face.title} is not drawn yet.` : "";
}

function noAxes(sheet: SheetAtHand): string {
  const face = cellAtHand(sheet);
  const panels = face === null ? undefined : figureOf(sheet, face)?.panels;
  return face !== null && (panels?.length ?? 0) > 0
    ? `${face.title} has several pairs of axes: write \`axes\` in the working that each belongs to.`
    : noFigure(sheet);
}

const figureOf = ({ view }: SheetAtHand, { slot }: CellFace) =>
  view.state.facet(sheetHost)?.views.get(slot)?.view.figure ?? null;
