import { type Curve, type Figure, placePoints, quoteOf, type TableData } from "../../figures/index.ts";
import type { CellFace, ShownView } from "../model/types.ts";

/** A number of a table that can be pointed at. Lengths are pixels of the page, from the column's top and left. */
export interface EntryPlace {
  readonly place: "entry";
  readonly slot: string;
  readonly formula: string;
  /** As it stands there. */
  readonly text: string;
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** A figure whose curves can be pointed at; the texts of their points are formulas. */
export interface FigurePlace {
  readonly place: "figure";
  readonly slot: string;
  readonly title: string;
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  /** Places of points are those of a plate of this width. */
  readonly unit: number;
  readonly curves: readonly Curve[];
}

export type QuotePlace = EntryPlace | FigurePlace;

/** Every number on the sheet, as far as it is drawn, that a sentence can quote; in the order of the text. */
export function quotePlaces(
  column: HTMLElement,
  faces: readonly CellFace[],
  views: ReadonlyMap<string, ShownView>,
): QuotePlace[] {
  const origin = column.getBoundingClientRect();
  return [...column.querySelectorAll<HTMLElement>(".hl-text .hl-cell[data-slot]")].flatMap((cell) => {
    const slot = cell.dataset.slot ?? "";
    const face = faces.find((each) => each.slot === slot);
    const view = views.get(slot)?.view;
    if (face === undefined || view === undefined) return [];
    const grids = [...cell.querySelectorAll<HTMLElement>(".hl-rows")];
    return face.parts.flatMap(({ part, title }): QuotePlace[] => {
      if (part === "figure") {
        const plate = cell.querySelector<SVGSVGElement>(".hl-figure svg");
        return plate === null || view.figure === null ? [] : figurePlaces(plate, view.figure, slot, title, origin);
      }
      const table = part === "table" ? view.table : view.points;
      const grid = grids.shift();
      return grid === undefined || table === null ? [] : entryPlaces(grid, table, slot, origin);
    });
  });
}

function figurePlaces(
  plate: SVGSVGElement,
  figure: Figure,
  slot: string,
  title: string,
  origin: DOMRect,
): FigurePlace[] {
  const { left, top, width, height } = plate.getBoundingClientRect();
  const placed = placePoints(figure, { width: Number(plate.getAttribute("width")) || width });
  const curves = placed.curves.flatMap(({ series, frame, points }): Curve[] => {
    const quoted = points.flatMap((point) => {
      const text = quoteOf(series, point.i);
      return text === "" ? [] : [{ ...point, text }];
    });
    const { name, parametric } = series;
    return quoted.length === 0 ? [] : [{ name, frame, points: quoted, inPlane: parametric === true }];
  });
  if (curves.length === 0) return [];
  const at = { left: left - origin.left, top: top - origin.top, width, height };
  return [{ place: "figure", slot, title, ...at, unit: placed.width, curves }];
}

function entryPlaces(grid: HTMLElement, table: TableData, slot: string, origin: DOMRect): EntryPlace[] {
  const shown = (grid.querySelector(".paper-grid") ?? grid).getBoundingClientRect();
  const rows = [...grid.querySelectorAll<HTMLTableRowElement>("tbody tr")];
  return rows.flatMap((row, r) =>
    [...row.cells].flatMap((cell, c): EntryPlace[] => {
      const entry = table.rows[r]?.[c];
      if (entry?.quote === undefined) return [];
      const whole = cell.getBoundingClientRect();
      // A wide table scrolls by itself: what is out of its sight cannot be pointed at.
      const [left, right] = [Math.max(whole.left, shown.left), Math.min(whole.right, shown.right)];
      if (right - left < whole.width / 2) return [];
      return [
        {
          place: "entry",
          slot,
          formula: entry.quote,
          text: `${entry.text}${entry.unsupported}`,
          left: left - origin.left,
          top: whole.top - origin.top,
          width: right - left,
          height: whole.height,
        },
      ];
    }),
  );
}
