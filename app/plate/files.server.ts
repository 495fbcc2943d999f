import { cellRecord } from "../cells/index.ts";
import { type LatexPaper, plateToLatex } from "../export/index.ts";
import { figureToSvg } from "../figures/index.server.ts";
import { figureToCsv, tableToCsv } from "../figures/index.ts";
import type { GalleyPaperProps } from "../galley/index.ts";
import { setPaper } from "../print/index.ts";
import type { Plate } from "./plate.ts";

/** Something taken away of a plate: text as it is, or LaTeX that is still to be set. */
export type TakenAway = { readonly type: string; readonly text: string } | { readonly latex: LatexPaper };

type Take = (plate: Plate, printed: GalleyPaperProps) => TakenAway | null;

const CSV = "text/csv; charset=utf-8";

/** What may be taken away, by file name; null where the cell has no such part. */
const FILES: ReadonlyMap<string, Take> = new Map<string, Take>([
  ["points.csv", ({ view }) => (view.figure ? { type: CSV, text: figureToCsv(view.figure) } : null)],
  ["table.csv", ({ view }) => (view.table ? { type: CSV, text: tableToCsv(view.table) } : null)],
  ["plate.svg", ({ view }) => (view.figure ? { type: "image/svg+xml", text: figureToSvg(view.figure) } : null)],
  ["result.json", takeRecord],
  ["plate.pdf", takeLatex],
]);

export const FILE_NAMES: readonly string[] = [...FILES.keys()];

/** A file of a plate; null where there is none of that name, or the cell has no such part. */
export function takeAway(file: string, plate: Plate, printed: GalleyPaperProps): TakenAway | null {
  return FILES.get(file)?.(plate, printed) ?? null;
}

function takeRecord({ planned, result, view, parameters }: Plate): TakenAway {
  return {
    type: "application/json",
    text: `${JSON.stringify(cellRecord(planned, result, view, parameters), null, 2)}\n`,
  };
}

const WIDTH_MM = 120;

function takeLatex({ view, planned }: Plate, { paper, plan, results, shown }: GalleyPaperProps): TakenAway | null {
  if (!view.figure) return null;
  return { latex: plateToLatex(view.figure, setPaper(paper, plan, results, shown), planned.line, WIDTH_MM) };
}
