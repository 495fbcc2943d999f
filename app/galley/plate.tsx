import { renderToStaticMarkup } from "react-dom/server";
import type { TableData } from "../figures/index.ts";
import { type CellNode, type PrintedPart, walk } from "../paper/index.ts";
import { setPaper } from "../print/index.ts";
import { Caption, ResultTable } from "./cell.tsx";
import type { GalleyPaperProps } from "./galley-paper.tsx";
import { makeSetting } from "./setting.ts";

/** The words and tables of one cell, set for a page of its own. HTML of our making. */
export interface PlateMarkup {
  /** "Figure 1"; null for a cell that prints nothing. */
  readonly title: string | null;
  readonly caption: string;
  readonly table: string;
  readonly points: string;
}

/** The cell's first figure or table as its plate shows it; null when the paper has no such cell. */
export function renderPlate({ paper, plan, results, shown }: GalleyPaperProps, cellId: string): PlateMarkup | null {
  const node = cellNode(paper.root.children, cellId);
  if (node === null) return null;
  const setting = makeSetting(setPaper(paper, plan, results, shown));
  const set = setting.set.cell(node.cell);
  const part: PrintedPart | undefined = node.parts.find((one) => one.part === "figure") ?? node.parts[0];
  const title = part === undefined ? null : `${part.noun} ${part.number}`;
  const table = (data: TableData | null | undefined, name: string) =>
    data ? renderToStaticMarkup(<ResultTable name={name} table={data} setting={setting} />) : "";
  return {
    title,
    caption:
      part === undefined
        ? ""
        : renderToStaticMarkup(<Caption node={node} part={part} set={set} first={true} setting={setting} />),
    table: table(set.view?.table, "Table"),
    points: table(set.view?.points, "Points of the figure"),
  };
}

function cellNode(nodes: Parameters<typeof walk>[0], id: string): CellNode | null {
  let found: CellNode | null = null;
  walk(nodes, (node) => {
    if (node.type === "cell" && node.cell.id === id) found ??= node;
  });
  return found;
}
