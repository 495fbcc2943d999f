import type { Frame } from "./curve.ts";
import { layoutOnPage } from "./layout.ts";
import type { PlateSize } from "./plot-layout.ts";
import { isWithin, plotted, plottedY } from "./range.ts";
import type { Figure, Series } from "./types.ts";

/** A curve or a row of points on a plate, with the place of each of its points. */
export interface PlacedCurve {
  /** The figure whose axes it is drawn on: the whole, a panel or an inset. */
  readonly figure: Figure;
  readonly series: Series;
  /** Between the axes, on the plate. */
  readonly frame: Frame;
  readonly points: readonly PlacedPoint[];
}

export interface PlacedPoint {
  /** Index into the series. */
  readonly i: number;
  /** From the left and the top of the plate, in the unit of its size. */
  readonly x: number;
  readonly y: number;
}

/** A plate on the page with the places of its points. */
export interface PlacedPoints {
  /** CSS pixels, as the plate is drawn where there is room. */
  readonly width: number;
  readonly height: number;
  readonly curves: readonly PlacedCurve[];
}

/** Where the points stand that a reader may ask for: those within the axes. Bands alone and gaps have none. */
export function placePoints(figure: Figure, size: Omit<PlateSize, "fontSize">): PlacedPoints {
  const { width, height, plots } = layoutOnPage(figure, size);
  const curves = plots.flatMap(({ figure: part, plot, left, top }) => {
    const { frame, inner, x, y } = plot;
    const across = (at: number) => left + frame.left + ((at - x.low) / (x.high - x.low)) * (frame.right - frame.left);
    const down = (at: number) => top + inner.bottom - ((at - y.low) / (y.high - y.low)) * (inner.bottom - inner.top);
    const onPlate: Frame = {
      left: left + frame.left,
      right: left + frame.right,
      top: top + frame.top,
      bottom: top + frame.bottom,
    };
    return part.series.map((series) => ({
      figure: part,
      series,
      frame: onPlate,
      points: series.x.flatMap((value, i) => {
        const px = plotted(part.x, value);
        const py = plottedY(part.y, series, i);
        return isWithin(px, x) && isWithin(py, y) ? [{ i, x: across(px), y: down(py) }] : [];
      }),
    }));
  });
  return { width, height, curves };
}
